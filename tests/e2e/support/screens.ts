import type { Page } from '@playwright/test';
import { expectAccessibleInBothThemes, expectNoSidewaysScroll } from './accessibility.js';

/** What holds for every screen: no violation by axe in either theme, nothing to scroll sideways at 390 and 320 px. */
export async function expectGoodScreen(page: Page): Promise<void> {
  await page.emulateMedia({ reducedMotion: 'reduce' });
  await expectAccessibleInBothThemes(page);
  await page.emulateMedia({ colorScheme: 'light' });
  const before = page.viewportSize();
  for (const width of [390, 320]) {
    await page.setViewportSize({ width, height: 800 });
    await expectNoSidewaysScroll(page);
  }
  if (before) await page.setViewportSize(before);
}

/** Everything the page complains about while a test runs; a test ends with none. */
export function complaintsOf(page: Page): string[] {
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    const isRefusedRequest = message.text().startsWith('Failed to load resource');
    if (['error', 'warning'].includes(message.type()) && !isRefusedRequest) complaints.push(message.text());
  });
  return complaints;
}
