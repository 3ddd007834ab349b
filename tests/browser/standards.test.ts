import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../support/browser';
import { signedIn } from '../support/signed-in';

let browser: Browser;
let page: Page;
beforeAll(async () => {
  browser = await launchBrowser();
  page = await signedIn(browser, 'pi');
});
afterAll(() => browser.close());

/** Name of the star whose row is marked, and of the star whose particulars are shown. */
const marked = async (): Promise<readonly (string | undefined)[]> => [
  (await page.locator('tr[aria-selected=true] th').textContent())?.trim(),
  (await page.locator('section h2').nth(1).textContent())?.trim(),
];

describe('the pages of standard stars', () => {
  it('list the fields and lead by a star’s name, in any spelling, to its field with the star marked', async () => {
    await page.goto('/standards');
    expect(await page.getByRole('link', { name: 'SA 98', exact: true }).count()).toBe(1);
    await page.getByLabel('Star').fill('g163-51e');
    await page.getByRole('button', { name: 'Find' }).click();
    const hit = page.getByRole('row', { name: /G163 51E/ });
    await hit.getByRole('link').click();
    await page.getByRole('heading', { name: 'G163-50/51' }).waitFor();
    expect(await marked()).toEqual(['G163 51E', 'G163 51E']);
    expect(await page.getByText('the published position belongs to another star').count()).toBeGreaterThan(0);
    expect(await page.getByText('Landolt 2009, AJ 137, 4186').count()).toBeGreaterThan(0);
  });

  it('link chart and table: a key in the table and the pointer on the chart mark the same star in both', async () => {
    await page.goto('/standards/sa98');
    await page.getByRole('button', { name: '98 961' }).focus();
    await page.keyboard.press('ArrowDown');
    expect(await marked()).toEqual(['98 966', '98 966']);
    await page.keyboard.press('End');
    expect((await marked())[0]).toBe('98 733');
    await page.locator('g[data-star="98 670"]').hover();
    expect(await marked()).toEqual(['98 670', '98 670']);
    await page.locator('g[data-star="98 978"]').click();
    expect(await page.evaluate(() => document.activeElement?.textContent)).toBe('98 978');
  });

  it('say so at an address where no field is', async () => {
    const answer = await page.goto('/standards/no-such-field');
    expect(answer?.status()).toBe(404);
  });
});
