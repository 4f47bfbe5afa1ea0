import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, type Page, test } from '@playwright/test';
import { newProject, signedIn } from './support/people.js';
import { complaintsOf, expectGoodScreen } from './support/screens.js';

const DIALECTS = 'tests/fixtures/text-dialects';
const chooser = (page: Page) => page.getByLabel('Files of sweeps');
const file = (page: Page, name: string) =>
  page.getByRole('list', { name: 'Files' }).getByRole('listitem').filter({ hasText: name });
const folder = mkdtempSync(join(tmpdir(), 'hummock-unpack-'));
test.afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Unpack of a new project; answers the project's path. */
async function openUnpack(page: Page): Promise<string> {
  await signedIn(page);
  const project = await newProject(page);
  await page.goto(`${project}/add`);
  return project;
}
async function sweepsOf(page: Page, project: string): Promise<{ name: string }[]> {
  const answer = await page.request.get(`/api/projects/${project.split('/').at(-1)}/sweeps?limit=500`);
  return ((await answer.json()) as { items: { name: string }[] }).items;
}
/** A table of |Z| over frequency as text, made here: only its form matters. */
function table(rows: number, { separator = ',', mark = '.' } = {}, seed = 1): string {
  const lines = Array.from({ length: rows }, (_, i) => {
    const f = 10 * 2000 ** (i / (rows - 1));
    const z = 6 + 30 / (1 + (5 * (f / 50 - 50 / f)) ** 2) + seed / 1000;
    return [f.toFixed(4), z.toFixed(5)].join(separator).replaceAll('.', mark);
  });
  return [['frequency_hz', 'magnitude_ohm'].join(separator), ...lines, ''].join('\n');
}

test('forty files at once each get their own state, comma and point decimals are both read right, Undo takes all back', async ({
  page,
}) => {
  const complaints = complaintsOf(page);
  const project = await openUnpack(page);
  const files = Array.from({ length: 40 }, (_, i) => {
    const dialect = i % 2 === 0 ? {} : { separator: ';', mark: ',' };
    return { name: `unit-${i + 1}.csv`, mimeType: 'text/csv', buffer: Buffer.from(table(200, dialect, i + 1)) };
  });
  await chooser(page).setInputFiles(files);
  await expect(page.getByText('40 of 40 read.')).toBeVisible({ timeout: 30_000 });
  await expect(page.getByRole('list', { name: 'Files' }).getByRole('listitem')).toHaveCount(40);
  await page.getByRole('button', { name: 'unit-2.csv' }).first().click();
  await expect(page.getByLabel('Decimal mark')).toHaveValue('comma', { timeout: 15_000 });
  await page.getByRole('button', { name: 'Add 40 sweeps' }).click();
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 90_000 });
  expect(await sweepsOf(page, project)).toHaveLength(40);
  await page.getByRole('button', { name: 'Undo', exact: true }).last().click();
  await expect(page.getByText(/40\ssweeps taken back\./)).toBeVisible();
  expect(await sweepsOf(page, project)).toEqual([]);
  expect(complaints).toEqual([]);
});

test('each unusable file is refused in words, and the others go on', async ({ page }) => {
  await openUnpack(page);
  const bad: Record<string, string> = {
    'all-nan.csv': 'No rows of numbers',
    'archive-renamed.txt': 'An archive instead of data',
    'binary-junk.txt': 'Not a text file',
    'empty.txt': 'The file is empty',
    'negative-frequencies.txt': 'Negative frequencies',
    'one-column.txt': 'Fewer than two columns',
    'page.html': 'A web page instead of data',
    'whitespace-only.csv': 'The file is empty',
  };
  const good = 'semicolon-decimal-comma.csv';
  await chooser(page).setInputFiles([
    ...Object.keys(bad).map((name) => `${DIALECTS}/bad/${name}`),
    `${DIALECTS}/${good}`,
  ]);
  for (const [name, words] of Object.entries(bad)) {
    await expect(file(page, name)).toContainText('Cannot read', { timeout: 20_000 });
    await expect(file(page, name)).toContainText(words);
  }
  await expect(file(page, good)).toContainText(/Ready|Needs a look/);
  await expect(page.getByText('1 of 9 read. 8 of 9 could not be read.')).toBeVisible();
  await page.getByRole('button', { name: 'Remove what cannot be read' }).click();
  await expect(page.getByRole('button', { name: 'Add 1 sweep' })).toBeVisible();
});

test('a file may be corrected, each part says why, and the correction holds for the files that look the same', async ({
  page,
}) => {
  const project = await openUnpack(page);
  const files = [1, 2, 3].map((seed) => ({
    name: `lot-${seed}.txt`,
    mimeType: 'text/plain',
    buffer: Buffer.from(table(60, { separator: '\t' }, seed).replace(/^.*\n/, '')),
  }));
  await chooser(page).setInputFiles(files);
  await expect(page.getByText('3 of 3 read.')).toBeVisible({ timeout: 20_000 });
  const rule = page.locator('details').filter({ hasText: 'Reading rule' });
  if (!(await page.getByLabel('Unit of frequency').isVisible())) await rule.locator('summary').first().click();
  await expect(rule).toContainText(/tab, because \d+ of \d+ lines agree/i);
  await page.getByLabel('Unit of frequency').selectOption('kHz');
  await expect(rule).toContainText('set by you');
  await page.getByRole('button', { name: 'Use for the 2 that look the same' }).click();
  await expect(page.getByText('3 of 3 read.')).toBeVisible();
  await page.getByRole('button', { name: 'Add 3 sweeps' }).click();
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  const sweeps = (await sweepsOf(page, project)) as unknown as { revision: { minFrequencyHz: number } }[];
  expect(sweeps.map(({ revision }) => Math.round(revision.minFrequencyHz))).toEqual([10_000, 10_000, 10_000]);
});

test('the same file twice is recognised, in one drop and in the project', async ({ page }) => {
  const project = await openUnpack(page);
  const name = 'bom-crlf.csv';
  const copy = { name: 'copy.csv', mimeType: 'text/csv', buffer: readFileSync(`${DIALECTS}/${name}`) };
  await chooser(page).setInputFiles(`${DIALECTS}/${name}`);
  await expect(file(page, name)).toContainText(/Ready|Needs a look/, { timeout: 20_000 });
  await chooser(page).setInputFiles(copy);
  await expect(file(page, 'copy.csv')).toContainText('Already here', { timeout: 20_000 });
  await page.getByRole('button', { name: 'Add 1 sweep' }).click();
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  await page.goto(`${project}/add`);
  await chooser(page).setInputFiles(copy);
  await expect(file(page, 'copy.csv')).toContainText('This file is here already, as “bom-crlf”.', { timeout: 20_000 });
  await expect(page.getByRole('button', { name: 'Add 0 sweeps' })).toHaveAttribute('aria-disabled', 'true');
});

test('the source comes back byte for byte, with its fingerprint', async ({ page }) => {
  const project = await openUnpack(page);
  const path = `${DIALECTS}/utf16le.txt`;
  await chooser(page).setInputFiles(path);
  await page.getByRole('button', { name: 'Add 1 sweep' }).click({ timeout: 20_000 });
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  await page.goto(project);
  await page.getByRole('region', { name: 'Ledger' }).getByRole('link', { name: 'utf16le' }).click();
  await page.getByRole('tab', { name: 'Facts' }).click();
  const downloading = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Download the source file' }).click();
  const download = await downloading;
  expect(download.suggestedFilename()).toBe('utf16le.txt');
  expect(readFileSync(await download.path()).equals(readFileSync(path))).toBe(true);
  const sha256 = createHash('sha256').update(readFileSync(path)).digest('hex');
  await expect(page.getByText(sha256)).toBeVisible();
});

test('a role asks for what belongs to it before anything is stored', async ({ page }) => {
  const project = await openUnpack(page);
  await chooser(page).setInputFiles(`${DIALECTS}/tab-plain.txt`);
  await page.getByLabel('Added as').selectOption('added-mass');
  await expect(page.getByText('Weigh the mass first')).toBeVisible();
  await expect(page.getByText('Use brass, steel or putty rather than lead')).toBeHidden();
  await page.getByText('Before you connect anything').click();
  await expect(page.getByText('Use brass, steel or putty rather than lead')).toBeVisible();
  const add = page.getByRole('button', { name: 'Add 1 sweep' });
  await expect(add).toHaveAccessibleDescription(/lacks a mass/, { timeout: 20_000 });
  await page.getByLabel('Added mass').fill('0,5 oz');
  await expect(page.getByText('Understood as 14.17 g')).toBeVisible(); // half of 28.349523125 g, by definition
  await add.click();
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  const [sweep] = (await sweepsOf(page, project)) as unknown as { conditions: { role: string; addedMassKg: number } }[];
  expect(sweep?.conditions.role).toBe('added-mass');
  expect(sweep?.conditions.addedMassKg).toBeCloseTo(0.0141747615625, 12);
});

test('text may be pasted instead of a file', async ({ page }) => {
  await openUnpack(page);
  await page.getByLabel('Or paste a table of numbers').fill(table(30));
  await page.getByRole('button', { name: 'Add the pasted text' }).click();
  await expect(file(page, 'Pasted sweep')).toContainText(/Ready|Needs a look/, { timeout: 20_000 });
});

test('a file of 30 MB can be typed beside while it is read, and its reading can be stopped', async ({ page }) => {
  test.slow();
  await openUnpack(page);
  const path = join(folder, 'long.csv');
  const rows = table(20_000).split('\n').slice(1, -1);
  writeFileSync(path, Array.from({ length: 100 }, () => rows.join('\n')).join('\n'));
  expect(statSync(path).size).toBeGreaterThan(30_000_000);
  await chooser(page).setInputFiles(path);
  await expect(file(page, 'long.csv')).toContainText('Reading');
  await page.getByLabel('Name of the sweep').fill('typed while it reads');
  await expect(file(page, 'long.csv')).toContainText('Reading'); // the bench holds the page's tasks to 100 ms
  await page.getByRole('button', { name: 'Stop' }).click();
  await expect(page.getByLabel('Or paste a table of numbers')).toBeVisible(); // nothing is left of it
  await chooser(page).setInputFiles(path);
  await expect(file(page, 'long.csv')).toContainText(/Ready|Needs a look/, { timeout: 120_000 });
});

test('a file of 200 MB is refused by its length, before it is read', async ({ page }) => {
  await openUnpack(page);
  const path = join(folder, 'huge.csv');
  writeFileSync(path, '');
  truncateSync(path, 200 * 1024 * 1024);
  await chooser(page).setInputFiles(path);
  await expect(file(page, 'huge.csv')).toContainText('Too large', { timeout: 15_000 });
  await expect(page.getByRole('alert')).toContainText('200 MB');
});

test('stopping while sweeps are being stored leaves nothing behind', async ({ page }) => {
  const project = await openUnpack(page);
  const files = Array.from({ length: 30 }, (_, i) => ({
    name: `unit-${i + 1}.csv`,
    mimeType: 'text/csv',
    buffer: Buffer.from(table(400, {}, i + 1)),
  }));
  await chooser(page).setInputFiles(files);
  await expect(page.getByText('30 of 30 read.')).toBeVisible({ timeout: 30_000 });
  await page.getByRole('button', { name: 'Add 30 sweeps' }).click();
  await expect(page.getByText(/[1-9]\d* of 30 stored/)).toBeVisible({ timeout: 30_000 });
  await page.getByRole('button', { name: 'Stop' }).click();
  await expect(page.getByText('Stopped. Nothing was stored.')).toBeVisible({ timeout: 30_000 });
  expect(await sweepsOf(page, project)).toEqual([]);
  await expect(page.getByRole('button', { name: 'Add 30 sweeps' })).toBeVisible(); // and can be tried again
});

test('a stored sweep is read again by another rule, as a new revision', async ({ page }) => {
  const project = await openUnpack(page);
  await chooser(page).setInputFiles(`${DIALECTS}/magnitude-only.txt`);
  await page.getByRole('button', { name: 'Add 1 sweep' }).click({ timeout: 20_000 });
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  await page.goto(project);
  await page.getByRole('region', { name: 'Ledger' }).getByRole('link', { name: 'magnitude-only' }).click();
  await page.getByRole('tab', { name: 'Reading rule' }).click();
  await page.getByLabel('Unit of impedance').selectOption('kilohm');
  await page.getByRole('button', { name: 'Read again' }).click();
  await expect(page.getByText('Read again: revision 2.')).toBeVisible();
  await page.getByRole('tab', { name: 'Revisions' }).click();
  await expect(page.getByRole('listitem').filter({ hasText: 'Revision 2' })).toContainText('newest');
});

test('all twenty-six dialects are read, none is refused', async ({ page }) => {
  await openUnpack(page);
  const names = readdirSync(DIALECTS).filter((name) => /\.(csv|txt)$/.test(name));
  await chooser(page).setInputFiles(names.map((name) => `${DIALECTS}/${name}`));
  await expect(page.getByText(`${names.length} of ${names.length} read.`)).toBeVisible({ timeout: 60_000 });
});

test('Unpack with files in it is accessible in both themes and narrow windows', async ({ page }) => {
  await openUnpack(page);
  await chooser(page).setInputFiles([`${DIALECTS}/magnitude-only.txt`, `${DIALECTS}/bad/page.html`]);
  await expect(page.getByText('1 of 2 read. 1 of 2 could not be read.')).toBeVisible({ timeout: 20_000 });
  await expectGoodScreen(page);
  await page.getByRole('button', { name: 'page.html' }).first().click();
  await expectGoodScreen(page);
});

test('the screens of a stored sweep and of an item are accessible in both themes and narrow windows', async ({
  page,
}) => {
  test.slow();
  const project = await openUnpack(page);
  await chooser(page).setInputFiles(`${DIALECTS}/tab-plain.txt`);
  await page.getByLabel(/^Item/).selectOption('new');
  await page.getByLabel('Name of the new item').fill('Mid-woofer 1');
  await page.getByRole('button', { name: 'Make the item' }).click();
  await expect(page.getByLabel(/^Item/)).toContainText('Mid-woofer 1');
  await page.getByRole('button', { name: 'Add 1 sweep' }).click({ timeout: 20_000 });
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
  await page.goto(project);
  await expect(page.getByRole('img', { name: 'Shape of the impedance of tab-plain' })).toBeVisible();
  await expectGoodScreen(page);
  await page.getByRole('region', { name: 'Ledger' }).getByRole('link', { name: 'tab-plain' }).click();
  await expect(page.getByRole('heading', { name: 'First lines of the file' })).toBeVisible({ timeout: 20_000 });
  for (const tab of ['What it is', 'Facts', 'Reading rule', 'Revisions']) {
    await page.getByRole('tab', { name: tab }).click();
    await expectGoodScreen(page);
  }
  await page.goto(project);
  await page.getByRole('region', { name: 'Items' }).getByRole('link', { name: 'Mid-woofer 1' }).click();
  await expect(page.getByRole('heading', { name: 'Mid-woofer 1', level: 1 })).toBeVisible();
  await expectGoodScreen(page);
});

test('files become sweeps by keyboard alone', async ({ page }) => {
  await openUnpack(page);
  const choosing = page.waitForEvent('filechooser');
  await page.getByRole('button', { name: 'Choose files' }).focus();
  await page.keyboard.press('Enter');
  await (await choosing).setFiles(`${DIALECTS}/tab-plain.txt`);
  await expect(page.getByText('1 of 1 read.')).toBeVisible({ timeout: 20_000 });
  for (let i = 0; i < 80; i += 1) {
    await page.keyboard.press('Tab');
    if (await page.getByRole('button', { name: 'Add 1 sweep' }).evaluate((button) => button === document.activeElement))
      break;
  }
  await page.keyboard.press('Enter');
  await expect(page).toHaveURL(/\/sheet\//, { timeout: 60_000 });
});

test('without an account and without a connection, files become curves that are there again after a reload', async ({
  page,
  context,
}) => {
  const complaints = complaintsOf(page);
  await page.goto('/');
  await page.evaluate(async () => {
    await navigator.serviceWorker.ready;
    while (!navigator.serviceWorker.controller) await new Promise((resolve) => setTimeout(resolve, 50));
  });
  await context.setOffline(true);
  await chooser(page).setInputFiles(`${DIALECTS}/comma-header.csv`);
  await expect(page).toHaveURL(/\/try$/);
  await expect(file(page, 'comma-header.csv')).toContainText(/Ready|Needs a look/, { timeout: 20_000 });
  await page.getByRole('button', { name: 'Add 1 sweep' }).click();
  const ledger = page.getByRole('region', { name: 'Ledger' });
  await expect(ledger.getByText('comma-header')).toBeVisible({ timeout: 20_000 });
  await page.reload();
  await expect(ledger.getByText('comma-header')).toBeVisible({ timeout: 20_000 });
  expect(complaints).toEqual([]);
});
