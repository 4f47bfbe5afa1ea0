import { readFile } from 'node:fs/promises';
import AxeBuilder from '@axe-core/playwright';
import { type CDPSession, expect, type Locator, type Page, test } from '@playwright/test';
import type { ChartState } from '../../shared/drawing/chart-input.js';
import { serveChartPage } from './chart-page/server.js';

/** Every row of the gestures table that concerns the chart, by mouse, by keys and by touch, on the chart's own page. */
let site: { url: string; stop: () => Promise<void> };
test.beforeAll(async () => {
  site = await serveChartPage();
});
test.afterAll(async () => site.stop());

const drawing = (page: Page): Locator => page.getByRole('application');
const state = async (page: Page): Promise<ChartState> =>
  JSON.parse((await page.getByTestId('state').textContent()) ?? '{}');
const shownHz = async (page: Page): Promise<[number, number]> =>
  (await state(page)).frequencyRangeHz ?? [10 / 1.05, 21_000];

async function open(page: Page, query = ''): Promise<{ x: number; y: number; width: number; height: number }> {
  await page.goto(`${site.url}?points=600&${query}`);
  await expect(page.locator('.chart-drawing svg text').first()).toBeVisible();
  await expect(page.getByRole('button', { name: 'Fit all' })).toBeVisible(); // the chart listens from here on
  await page.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))));
  const box = await drawing(page).boundingBox();
  if (!box) throw new Error('no chart');
  return box;
}
/** Waits until the 200 ms of a range change are over. */
async function settled(page: Page, check: (now: ChartState) => boolean): Promise<ChartState> {
  await expect.poll(async () => check(await state(page))).toBe(true);
  return state(page);
}

test.describe('by mouse', () => {
  test('a drag across zooms to that range, a diagonal one also the values, and Backspace goes back', async ({
    page,
  }) => {
    const box = await open(page);
    await page.mouse.move(box.x + 300, box.y + 250);
    await page.mouse.down();
    await page.mouse.move(box.x + 600, box.y + 255, { steps: 5 });
    await page.mouse.up();
    const across = await settled(page, (now) => now.frequencyRangeHz !== null);
    expect(across.magnitudeRangeOhm).toBeNull();
    await page.mouse.move(box.x + 300, box.y + 150);
    await page.mouse.down();
    await page.mouse.move(box.x + 600, box.y + 300, { steps: 5 });
    await page.mouse.up();
    const both = await settled(page, (now) => now.magnitudeRangeOhm !== null);
    expect(both.frequencyRangeHz?.[0]).toBeGreaterThan(across.frequencyRangeHz?.[0] ?? 0);
    await page.keyboard.press('Backspace');
    await settled(page, (now) => now.magnitudeRangeOhm === null);
    expect((await state(page)).frequencyRangeHz).toEqual(across.frequencyRangeHz);
    await drawing(page).dblclick({ position: { x: 400, y: 250 } });
    await settled(page, (now) => now.frequencyRangeHz === null);
  });

  test('a plain wheel scrolls the page and says how to zoom; Ctrl, or a click first, zooms', async ({ page }) => {
    const box = await open(page, 'tall=1');
    await page.mouse.move(box.x + 400, box.y + 250);
    await page.mouse.wheel(0, 200);
    await expect(page.getByText(/Hold (Ctrl|⌘) or click the chart to zoom/)).toBeVisible();
    await expect.poll(() => page.evaluate(() => window.scrollY)).toBeGreaterThan(50);
    expect((await state(page)).frequencyRangeHz).toBeNull();
    await expect(page.getByText(/click the chart to zoom/)).toBeHidden({ timeout: 4000 });
    await page.evaluate(() => window.scrollTo(0, 0));
    await page.mouse.move(box.x + 400, box.y + 250);
    await page.keyboard.down('Control');
    await page.mouse.wheel(0, -200);
    await page.keyboard.up('Control');
    const near = await settled(page, (now) => now.frequencyRangeHz !== null);
    await drawing(page).click({ position: { x: 400, y: 250 } });
    await page.mouse.wheel(0, -200);
    await settled(page, (now) => (now.frequencyRangeHz?.[0] ?? 0) > (near.frequencyRangeHz?.[0] ?? 0));
    expect(await page.evaluate(() => window.scrollY)).toBe(0);
  });

  test('a chart with nothing to scroll behind it zooms at once', async ({ page }) => {
    const box = await open(page, 'height=300');
    await page.mouse.move(box.x + 400, box.y + 150);
    await page.mouse.wheel(0, -200);
    await settled(page, (now) => now.frequencyRangeHz !== null);
  });

  test('Shift + wheel, the middle button and Space + drag pan without zooming', async ({ page }) => {
    const ratio = ([low, high]: [number, number]) => high / low;
    const box = await open(page, 'state={"frequencyRangeHz":[100,1000]}');
    await drawing(page).focus();
    await page.mouse.move(box.x + 400, box.y + 250);
    await page.keyboard.down('Shift');
    await page.mouse.wheel(0, 200);
    await page.keyboard.up('Shift');
    await settled(page, (now) => (now.frequencyRangeHz?.[0] ?? 0) > 101);
    const first = await shownHz(page);
    expect(ratio(first)).toBeCloseTo(10, 6);
    await page.mouse.down({ button: 'middle' });
    await page.mouse.move(box.x + 500, box.y + 250, { steps: 4 });
    await page.mouse.up({ button: 'middle' });
    await settled(page, (now) => (now.frequencyRangeHz?.[0] ?? 0) < first[0]);
    const second = await shownHz(page);
    await page.keyboard.down(' ');
    await page.mouse.down();
    await page.mouse.move(box.x + 400, box.y + 250, { steps: 4 });
    await page.mouse.up();
    await page.keyboard.up(' ');
    await settled(page, (now) => (now.frequencyRangeHz?.[0] ?? 0) > second[0]);
    expect(ratio(await shownHz(page))).toBeCloseTo(10, 6);
  });

  test('a drag along an axis stretches it; a click on it opens exact values and log or linear', async ({ page }) => {
    const box = await open(page);
    const below = box.y + box.height - 30;
    await page.mouse.move(box.x + 800, below);
    await page.mouse.down();
    await page.mouse.move(box.x + 500, below, { steps: 5 });
    await page.mouse.up();
    const stretched = await settled(page, (now) => now.frequencyRangeHz !== null);
    expect(stretched.frequencyRangeHz?.[0]).toBeCloseTo(10 / 1.05, 6);
    expect(stretched.frequencyRangeHz?.[1]).toBeGreaterThan(21_000);
    await page.mouse.click(box.x + 40, box.y + 200);
    const dialog = page.getByRole('dialog', { name: /Impedance/ });
    await dialog.getByLabel('Least').fill('0');
    await dialog.getByLabel('Most').fill('60');
    await dialog.getByRole('button', { name: 'Set' }).click();
    await expect(dialog.getByRole('alert')).toContainText('above 0');
    await dialog.getByLabel('linear').check();
    await dialog.getByRole('button', { name: 'Set' }).click();
    await expect(dialog).toBeHidden();
    const set = await settled(page, (now) => now.magnitudeRangeOhm !== null);
    expect([set.magnitudeScale, set.magnitudeRangeOhm]).toEqual(['linear', [0, 60]]);
    await expect(drawing(page)).toBeFocused();
  });

  test('a click sets A, Shift + click B, flags drag, and the values are those of the file', async ({ page }) => {
    const box = await open(page);
    await drawing(page).click({ position: { x: 300, y: 250 } });
    await drawing(page).click({ position: { x: 600, y: 250 }, modifiers: ['Shift'] });
    const set = await settled(page, (now) => now.cursorAHz !== null && now.cursorBHz !== null);
    expect(set.cursorBHz).toBeGreaterThan(set.cursorAHz ?? 0);
    // On a measured point: 600 points from 10 Hz to 20 kHz, equal steps of ln f.
    const step = (Math.log((set.cursorAHz ?? 1) / 10) / Math.log(2000)) * 599;
    expect(Math.abs(step - Math.round(step))).toBeLessThan(1e-6);
    const flag = page.locator('.chart-drawing svg g').last().locator('rect').first();
    const at = await flag.boundingBox();
    await page.mouse.move((at?.x ?? 0) + 20, (at?.y ?? 0) + 12);
    await page.mouse.down();
    await page.mouse.move((at?.x ?? 0) + 90, (at?.y ?? 0) + 12, { steps: 5 });
    await page.mouse.up();
    await settled(page, (now) => (now.cursorAHz ?? 0) > (set.cursorAHz ?? 0) * 1.2);
    expect(box.width).toBeGreaterThan(0);
  });

  test('Esc drops a drag, a right click opens the menu, a click on a line chooses its sweep', async ({ page }) => {
    const box = await open(page, 'count=2');
    await page.mouse.move(box.x + 300, box.y + 250);
    await page.mouse.down();
    await page.mouse.move(box.x + 600, box.y + 250, { steps: 4 });
    await page.keyboard.press('Escape');
    await page.mouse.up();
    expect((await state(page)).frequencyRangeHz).toBeNull();
    await drawing(page).click({ button: 'right', position: { x: 500, y: 250 } });
    await page.getByRole('menuitem', { name: 'Marker here' }).click();
    await expect(page.getByTestId('log')).toContainText('marker ');
    await expect(page.getByRole('menu')).toBeHidden();
  });
});

test.describe('by keys alone', () => {
  test('cursors, peaks, zoom, pan, scales and the other sweep', async ({ page }) => {
    await open(page);
    await page.keyboard.press('Tab');
    await expect(drawing(page)).toBeFocused();
    await page.keyboard.press('a');
    const a = (await settled(page, (now) => now.cursorAHz !== null)).cursorAHz ?? 0;
    expect(a).toBeGreaterThan(31.2);
    expect(a).toBeLessThan(32.4); // the peak of the active sweep
    await page.keyboard.press('ArrowRight');
    const next = (await settled(page, (now) => (now.cursorAHz ?? 0) > a)).cursorAHz ?? 0;
    expect(next / a).toBeCloseTo(2000 ** (1 / 599), 6);
    await page.keyboard.press('Shift+ArrowLeft');
    await settled(page, (now) => Math.abs((now.cursorAHz ?? 0) / next / 2000 ** (-10 / 599) - 1) < 1e-6);
    await expect(page.getByRole('status')).toHaveText(/^Cursor A: .*Hz, .*Ω .*°, W-0417$/);
    await page.keyboard.press('Home');
    await settled(page, (now) => now.cursorAHz === 10);
    await page.keyboard.press('p');
    await settled(page, (now) => Math.abs((now.cursorAHz ?? 0) - a) < 0.5);
    await page.keyboard.press('d');
    await settled(page, (now) => (now.cursorAHz ?? 0) > 150);
    await page.keyboard.press('b');
    await settled(page, (now) => now.cursorBHz !== null);
    await page.keyboard.press('+');
    const near = await settled(page, (now) => now.frequencyRangeHz !== null);
    await page.keyboard.press('-');
    await settled(page, (now) => (now.frequencyRangeHz?.[1] ?? 0) > (near.frequencyRangeHz?.[1] ?? 0));
    await page.keyboard.press('l');
    await settled(page, (now) => now.magnitudeScale === 'linear');
    await page.keyboard.press('Shift+L');
    await settled(page, (now) => now.frequencyScale === 'linear');
    await page.keyboard.press('0');
    await settled(page, (now) => now.frequencyRangeHz === null);
    await page.keyboard.press('ArrowDown');
    await expect(page.getByRole('status')).toHaveText('W-0418 chosen');
    await page.keyboard.press('m');
    await page.keyboard.press('n');
    await page.keyboard.press('r');
    await expect(page.getByTestId('log')).toContainText(/marker .*note .*reference/);
  });

  test('Shift + arrows pan while no cursor is set, and the browser keeps its own keys', async ({ page }) => {
    await open(page, 'state={"frequencyRangeHz":[100,1000]}');
    await drawing(page).focus();
    await page.keyboard.press('Shift+ArrowRight');
    await settled(page, (now) => Math.abs((now.frequencyRangeHz?.[0] ?? 0) - 125.89) < 0.1); // a tenth of a decade
    await page.keyboard.press('Control+a');
    expect((await state(page)).cursorAHz).toBeNull();
  });

  test('range and cursor fields take what people type', async ({ page }) => {
    await open(page);
    await page.getByLabel('Frequency from, Hz').fill('50');
    await page.getByLabel('Frequency to, Hz').fill('2k');
    await page.getByLabel('Frequency to, Hz').press('Enter');
    await settled(page, (now) => now.frequencyRangeHz?.[0] === 50 && now.frequencyRangeHz[1] === 2000);
    await page.getByLabel('Frequency from, Hz').fill('5000');
    await page.getByLabel('Frequency from, Hz').press('Enter');
    await expect(page.getByRole('alert')).toContainText('above the first');
    await page.keyboard.press('Escape');
    await page.getByLabel('Cursor A, Hz').fill('123,4');
    await page.getByLabel('Cursor A, Hz').press('Enter');
    await settled(page, (now) => now.cursorAHz === 123.4);
    await page.getByRole('button', { name: 'Remove cursor A' }).click();
    await settled(page, (now) => now.cursorAHz === null);
  });

  test('every axis has its exact values by keyboard, and the phase unwraps when asked', async ({ page }) => {
    await open(page);
    await page.getByRole('button', { name: 'Axes' }).press('Enter');
    await page.getByLabel('Axis', { exact: true }).selectOption('phase');
    const dialog = page.getByRole('dialog', { name: /^Phase/ });
    await dialog.getByLabel('Unwrap phase').check();
    await settled(page, (now) => now.isPhaseUnwrapped);
    await dialog.getByLabel('Least').fill('-45');
    await dialog.getByLabel('Most').fill('45');
    await page.keyboard.press('Enter');
    await settled(page, (now) => now.phaseRangeDeg?.[0] === -45 && now.phaseRangeDeg[1] === 45);
    await expect(drawing(page)).toBeFocused();
    await expect(page.locator('.chart-drawing svg text', { hasText: 'unwrapped' })).toBeVisible();
  });

  test('sentence and table say what the line shows', async ({ page }) => {
    await open(page, 'count=2');
    await page.getByRole('button', { name: 'As sentence' }).click();
    await expect(page.locator('.chart-sentence')).toHaveText(
      /^W-0417: peak 46\.\d\sΩ at 31\.\d\sHz, lowest 6\.\d+\sΩ at 2\d\d\sHz, rising to 27?8?\.?\d*\sΩ at 20\skHz\. W-0418 peaks 1\.\d\sHz higher\.$/,
    );
    await page.getByRole('button', { name: 'As table' }).click();
    const peak = page.getByRole('row', { name: /peak/ });
    await expect(peak).toContainText(/46\.\d+\sΩ/);
  });
});

test.describe('as files', () => {
  const saved = async (page: Page, name: string): Promise<{ name: string; bytes: Buffer }> => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name, exact: true }).click(),
    ]);
    return { name: download.suggestedFilename(), bytes: await readFile(await download.path()) };
  };

  test('the SVG holds legend and units, the PNG is twice the size, the CSV agrees with the cursors', async ({
    page,
  }) => {
    await open(page, 'count=2&theme=dark&state={"cursorAHz":31.8}');
    await page.getByRole('button', { name: 'Export' }).click();
    const svg = await saved(page, 'SVG');
    expect(svg.name).toBe('Rehearsal-room-2-mid-woofers.svg');
    for (const part of ['W-0418', 'Frequency, Hz', 'Impedance |Z|, Ω', 'Revision 3', '#FDFEFC']) {
      expect(svg.bytes.toString('utf8')).toContain(part);
    }
    const png = await saved(page, 'PNG 2×');
    expect(png.bytes.readUInt32BE(16)).toBe(2 * (await drawing(page).evaluate((element) => element.clientWidth)));
    await page.getByLabel('Decimal mark').selectOption('comma');
    await expect(page.getByRole('button', { name: 'CSV', exact: true })).toBeDisabled();
    await page.getByLabel('Separator').selectOption('semicolon');
    const csv = (await saved(page, 'CSV')).bytes.toString('utf8');
    expect(csv.split('\r\n')).toHaveLength(1 + 2 * 600 + 1);

    await drawing(page).focus();
    await page.keyboard.press('ArrowRight'); // from between two points to a measured one
    const hz = (await settled(page, (now) => now.cursorAHz !== 31.8)).cursorAHz ?? 0;
    const row = csv.split('\r\n').find((line) => line.startsWith(`"W-0417";${String(hz).replace('.', ',')};`));
    const ohm = Number(row?.split(';')[2]?.replace(',', '.'));
    await expect(page.locator('.chart-drawing svg text', { hasText: '°' }).last()).toHaveText(
      new RegExp(`^${ohm.toPrecision(4).replace('.', '\\.')}\\sΩ `),
    );
  });
});

test.describe('by touch', () => {
  test.use({ hasTouch: true, viewport: { width: 390, height: 844 } });
  const touch = async (cdp: CDPSession, type: 'touchStart' | 'touchMove' | 'touchEnd', points: [number, number][]) => {
    await cdp.send('Input.dispatchTouchEvent', { type, touchPoints: points.map(([x, y], id) => ({ x, y, id })) });
  };

  test('two fingers pinch, a double tap fits all, a long press slides the cursor, one finger scrolls', async ({
    page,
  }) => {
    const box = await open(page, 'height=460&tall=1');
    const cdp = await page.context().newCDPSession(page);
    const y = box.y + 220;
    await touch(cdp, 'touchStart', [
      [150, y],
      [210, y],
    ]);
    for (let k = 1; k <= 6; k += 1)
      await touch(cdp, 'touchMove', [
        [150 - k * 8, y],
        [210 + k * 8, y],
      ]);
    await touch(cdp, 'touchEnd', []);
    const near = await settled(page, (now) => now.frequencyRangeHz !== null);
    expect((near.frequencyRangeHz?.[1] ?? 0) / (near.frequencyRangeHz?.[0] ?? 1)).toBeLessThan(500);
    await page.touchscreen.tap(200, y);
    await page.touchscreen.tap(200, y);
    await settled(page, (now) => now.frequencyRangeHz === null);

    await touch(cdp, 'touchStart', [[120, y]]);
    await page.waitForTimeout(550);
    await touch(cdp, 'touchMove', [[160, y]]);
    await touch(cdp, 'touchMove', [[200, y]]);
    await touch(cdp, 'touchEnd', []);
    const set = await settled(page, (now) => now.cursorAHz !== null);
    expect(await page.evaluate(() => window.scrollY)).toBe(0);

    await touch(cdp, 'touchStart', [[200, y]]);
    for (let k = 1; k <= 8; k += 1) await touch(cdp, 'touchMove', [[200, y - k * 20]]);
    await touch(cdp, 'touchEnd', []);
    await expect.poll(() => page.evaluate(() => window.scrollY)).toBeGreaterThan(40);
    expect((await state(page)).cursorAHz).toBe(set.cursorAHz);
  });

  test('a long press lifted without sliding opens the menu of that place', async ({ page }) => {
    const box = await open(page, 'height=460');
    const cdp = await page.context().newCDPSession(page);
    await touch(cdp, 'touchStart', [[200, box.y + 220]]);
    await page.waitForTimeout(600);
    await touch(cdp, 'touchEnd', []);
    await page.getByRole('menuitem', { name: 'Note here' }).tap();
    await expect(page.getByTestId('log')).toContainText('note ');
  });

  test('a tap on an axis opens its values, and buttons step the cursor', async ({ page }) => {
    const box = await open(page, 'height=460&state={"cursorAHz":100}');
    await page.touchscreen.tap(box.x + 200, box.y + box.height - 24);
    await expect(page.getByRole('dialog', { name: /Frequency/ })).toBeVisible();
    await page.keyboard.press('Escape');
    await page
      .getByRole('group', { name: 'Chart controls' })
      .getByRole('button', { name: 'Cursor A: one point up' })
      .tap();
    await settled(page, (now) => (now.cursorAHz ?? 0) > 100);
  });
});

test.describe('for everyone', () => {
  for (const theme of ['light', 'dark']) {
    test(`axe finds nothing on the ${theme} chart`, async ({ page }) => {
      await open(page, `theme=${theme}&count=4&full=1&state={"cursorAHz":31.8,"frequencyRangeHz":[31,34]}`);
      await page.getByRole('button', { name: 'As table' }).click();
      const { violations } = await new AxeBuilder({ page }).include('.chart-figure').analyze();
      expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' ')}`)).toEqual([]);
    });
  }
  test('forced colours keep dashes and words in system colours', async ({ page }) => {
    await page.emulateMedia({ forcedColors: 'active' });
    await open(page);
    await expect(page.locator('.chart-drawing svg text').first()).toHaveAttribute('fill', 'CanvasText');
  });
  test('reduced motion changes the range at once', async ({ page }) => {
    await page.emulateMedia({ reducedMotion: 'reduce' });
    await open(page);
    await page.getByRole('button', { name: 'Zoom in' }).click();
    expect((await state(page)).frequencyRangeHz).not.toBeNull();
  });
  test('nothing sticks out sideways at 320 px', async ({ page }) => {
    await page.setViewportSize({ width: 320, height: 700 });
    await open(page, 'height=400');
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(320);
  });
});
