import { expect, type Locator, type Page, test } from '@playwright/test';
import { expectAccessibleInBothThemes, expectNoSidewaysScroll } from './support/accessibility.js';
import { newProject, signedIn } from './support/people.js';

/**
 * The story: two files in, Vas out, reload. Truth: tests/fixtures/vas-added-mass/truth.json, case vm-d01 (simulated
 * circuit, no noise): Vas 11.6477 L at ρc² 141835 Pa, which is 11.60 L in the product's usual air (141263 Pa,
 * CIPM-2007 at 20 °C, 101325 Pa, 50 %).
 */
const FILES = ['free', 'mass1'].map((part) => `tests/fixtures/vas-added-mass/vm-d01-drv-165-e-${part}.csv`);
const MASS = '9.977 g';
const DIAMETER = '126.2575 mm';
const VAS = /11\.60/;

test.beforeEach(() => test.setTimeout(240_000)); // eight readings by axe in one story

/** The row of a figure in the card: its header holds the everyday name and the symbol. */
const figure = (page: Page, name: string): Locator => page.getByRole('row').filter({ hasText: name }).first();

async function openProject(page: Page): Promise<string> {
  await signedIn(page);
  return newProject(page);
}

async function expectVasAfterReload(page: Page, openResults: () => Promise<void>): Promise<void> {
  await expect(figure(page, 'Vas')).toContainText(VAS, { timeout: 60_000 });
  await page.getByRole('button', { name: 'Keep', exact: true }).click();
  await expect(page.getByText(/Kept .+ by /)).toBeVisible();
  await expect(page.getByText('Saved')).toBeAttached();
  await page.reload();
  await openResults();
  await expect(figure(page, 'Vas')).toContainText(VAS, { timeout: 60_000 });
  await expect(page.getByText(/Kept .+ by /)).toBeVisible();
}

test('two files in, Vas out, kept and there again after a reload, by mouse', async ({ page }) => {
  const project = await openProject(page);
  await page.goto(`${project}/add`);
  await page.getByLabel('Files of sweeps').setInputFiles(FILES);
  await page.getByLabel('Added as').selectOption('free-air');
  await page.getByText('vm-d01-drv-165-e-mass1.csv').first().click();
  await page.getByLabel('Added as').selectOption('added-mass');
  await page.getByLabel('Added mass', { exact: true }).fill(MASS);
  await page.getByRole('button', { name: /^Add 2/ }).click();
  await page.waitForURL(/\/sheet\//);
  await page.getByRole('button', { name: 'Add Thiele/Small parameters' }).click();
  await page.locator('summary', { hasText: 'Settings' }).click();
  await page.getByLabel('Piston diameter', { exact: true }).fill(DIAMETER);
  await expectVasAfterReload(page, async () => {});
  await expectAccessibleInBothThemes(page);
});

test('changing a setting marks the kept result out of date, and running again makes it current', async ({ page }) => {
  await page.goto('/try?sample');
  await expect(figure(page, 'Vas')).toContainText('L', { timeout: 60_000 });
  await page.getByRole('button', { name: 'Keep', exact: true }).click();
  await expect(page.getByText(/Kept .+ by /)).toBeVisible();
  await page.locator('summary', { hasText: 'Settings' }).click();
  await page.getByLabel('Suspension').selectOption('constant');
  await expect(page.getByText('Out of date: the settings changed')).toBeVisible();
  await page.getByRole('button', { name: 'Run again' }).click();
  await expect(page.getByText('Not kept')).toBeVisible();
  await expect(figure(page, 'Vas')).toContainText('L', { timeout: 60_000 });
});

/** Presses Tab until what has the focus answers to a name, as a person without a pointer does. */
async function tabTo(page: Page, target: Locator, most = 120): Promise<void> {
  for (let presses = 0; presses < most; presses += 1) {
    if (await target.evaluate((element) => element === document.activeElement).catch(() => false)) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`${target} is not reached by ${most} presses of Tab`);
}

test('two files in, Vas out, by keyboard alone', async ({ page }) => {
  const project = await openProject(page);
  await page.goto(project);
  await tabTo(page, page.getByRole('button', { name: 'Add sweeps' }).first());
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/add$/);
  const chooser = page.waitForEvent('filechooser');
  await tabTo(page, page.getByRole('button', { name: 'Choose files' }));
  await page.keyboard.press('Enter');
  await (await chooser).setFiles(FILES);
  const role = page.getByLabel('Added as');
  await expect(role).toBeVisible();
  await tabTo(page, role);
  await page.keyboard.type('Driver in');
  await expect(role).toHaveValue('free-air');
  await tabBackTo(page, page.getByRole('button', { name: /vm-d01-drv-165-e-mass1\.csv/ }).first());
  await page.keyboard.press('Enter');
  await tabTo(page, page.getByLabel('Added as'));
  await page.keyboard.type('Driver with');
  await tabTo(page, page.getByLabel('Added mass', { exact: true }));
  await page.keyboard.type(MASS);
  await tabTo(page, page.getByRole('button', { name: /^Add 2/ }));
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/sheet\//);
  await tabTo(page, page.getByRole('button', { name: 'Add Thiele/Small parameters' }));
  await page.keyboard.press('Enter');
  await tabTo(page, page.locator('summary', { hasText: 'Settings' }));
  await page.keyboard.press('Enter');
  await tabTo(page, page.getByLabel('Piston diameter', { exact: true }));
  await page.keyboard.type(DIAMETER);
  await expect(figure(page, 'Vas')).toContainText(VAS, { timeout: 60_000 });
  await tabBackTo(page, page.getByRole('button', { name: 'Keep', exact: true }));
  await page.keyboard.press('Enter');
  await expect(page.getByText(/Kept .+ by /)).toBeVisible();
  await page.reload();
  await expect(figure(page, 'Vas')).toContainText(VAS, { timeout: 60_000 });
});

async function tabBackTo(page: Page, target: Locator, most = 120): Promise<void> {
  for (let presses = 0; presses < most; presses += 1) {
    if (await target.evaluate((element) => element === document.activeElement).catch(() => false)) return;
    await page.keyboard.press('Shift+Tab');
  }
  throw new Error(`${target} is not reached by ${most} presses of Shift Tab`);
}

test.describe('on a phone', () => {
  test.use({ viewport: { width: 390, height: 844 }, hasTouch: true });

  test('two files in, Vas out, reload, at 390 px', async ({ page }) => {
    const project = await openProject(page);
    await page.goto(`${project}/add`);
    await page.getByLabel('Files of sweeps').setInputFiles(FILES);
    await page.getByLabel('Added as').selectOption('free-air');
    await page.getByText('vm-d01-drv-165-e-mass1.csv').first().tap();
    await page.getByLabel('Added as').selectOption('added-mass');
    await page.getByLabel('Added mass', { exact: true }).fill(MASS);
    await expectNoSidewaysScroll(page);
    await page.getByRole('button', { name: /^Add 2/ }).tap();
    await page.waitForURL(/\/sheet\//);
    await page.getByRole('button', { name: 'Results' }).tap();
    await page.getByRole('button', { name: 'Add Thiele/Small parameters' }).tap();
    await page.locator('summary', { hasText: 'Settings' }).tap();
    await page.getByLabel('Piston diameter', { exact: true }).fill(DIAMETER);
    await expectVasAfterReload(page, () => page.getByRole('button', { name: 'Results' }).tap());
    for (const pane of ['Ledger', 'Chart', 'Results', 'Footnotes']) {
      await page.getByRole('button', { name: pane, exact: true }).tap();
      await expectNoSidewaysScroll(page);
      await expectAccessibleInBothThemes(page);
    }
  });
});
