import type { Page } from 'playwright-core';
import { expect } from 'vitest';
import { litPixels } from './lit-pixels';

/** Scans the page as it stands: nothing but black and red, and some red. */
export async function expectDark(page: Page, what: string): Promise<void> {
  const { count, first, red } = litPixels(await page.screenshot({ fullPage: true }));
  expect(count, `${what}: green or blue at ${first}`).toBe(0);
  expect(red, `${what} shows nothing`).toBeGreaterThan(100);
}
