import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { chromium } from '@playwright/test';
import playwrightConfig from '../../playwright.config.js';

/**
 * `npm run pictures -- http://127.0.0.1:4680`: the README's pictures, of the sample on a running Hummock. Invented data,
 * drawn from a model.
 */
const address = process.argv[2];
if (!address) {
  console.error('Say where Hummock runs: npm run pictures -- http://127.0.0.1:4680');
  process.exit(2);
}
const folder = join(import.meta.dirname, '..', '..', 'public', 'pictures');
mkdirSync(folder, { recursive: true });
const browser = await chromium.launch(playwrightConfig.use?.launchOptions ?? {});
for (const colorScheme of ['light', 'dark'] as const) {
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 }, colorScheme, locale: 'en-GB' });
  await page.goto(new URL('/try?sample', address).href);
  await page.getByRole('row').filter({ hasText: 'Vas' }).first().waitFor({ timeout: 120_000 });
  await page.getByRole('button', { name: 'Next peak' }).click();
  await page.waitForTimeout(600); // the range change has come to rest
  await page.screenshot({ path: join(folder, `sheet-${colorScheme}.png`) });
  await page.close();
}
await browser.close();
