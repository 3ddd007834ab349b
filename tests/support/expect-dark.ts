import type { Page } from 'playwright-core';
import { expect } from 'vitest';
import { litPixels } from './lit-pixels';

/** Scans the page as it stands: nothing but black and red, and some red. */
export async function expectDark(page: Page, what: string): Promise<void> {
  const { count, first, red } = litPixels(await page.screenshot({ fullPage: true }));
  expect(count, `${what}: green or blue at ${first}`).toBe(0);
  expect(red, `${what} shows nothing`).toBeGreaterThan(100);
}

/** The same on a desk's screen and on a phone's, neither of which the page may be wider than. */
export async function expectDarkOnScreens(page: Page): Promise<void> {
  for (const width of [1440, 390]) {
    await page.setViewportSize({ width, height: 900 });
    await page.waitForTimeout(300);
    await expectDark(page, `${width} px`);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
  }
}
