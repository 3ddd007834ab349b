import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { launchBrowser } from '../support/browser';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

const address = `${inject('baseUrl')}/api-reference`;
async function pageAt(width: number, hash = ''): Promise<Page> {
  const context = await browser.newContext({ viewport: { width, height: 900 } });
  const page = await context.newPage();
  await page.goto(`${address}${hash}`);
  return page;
}

describe('the page of the HTTP interface', () => {
  it('finds calls by words, with the keyboard alone', async () => {
    const page = await pageAt(1280);
    await page.keyboard.press('/');
    await page.keyboard.type('frames 5,000');
    await page.getByText('1 found').waitFor();
    const shown = page.locator('details').filter({ hasText: '/nights/{id}/frames' });
    expect(await shown.count()).toBe(1);
    await page.keyboard.press('Tab');
    await page.keyboard.press('Enter');
    await shown.getByText('All of them or none').waitFor();
    await page.locator('input[type=search]').fill('no such words');
    await page.getByText('No call has all of these words').waitFor();
    await page.context().close();
  });

  it('opens the call, or the form, that a link leads to', async () => {
    const page = await pageAt(1280, '#logFrames');
    await page.locator('details#logFrames[open]').waitFor();
    await page.locator('details#logFrames').getByRole('link', { name: 'FrameInput' }).first().click();
    await page.locator('details#schema-FrameInput[open]').waitFor();
    expect(await page.locator('details#schema-FrameInput').getByText('utc_start').isVisible()).toBe(true);
    await page.context().close();
  });

  it('never scrolls sideways at 390 px, with everything open', async () => {
    const page = await pageAt(390);
    const width = await page.evaluate(() => {
      for (const details of document.querySelectorAll('details')) details.open = true;
      return document.documentElement.scrollWidth;
    });
    expect(width).toBe(390);
    await page.context().close();
  });

  it('asks nothing of other hosts, and is sound to assistive technology', async () => {
    const page = await pageAt(1280);
    const foreign: string[] = [];
    page.on('request', (request) => {
      if (!request.url().startsWith(inject('baseUrl'))) foreign.push(request.url());
    });
    await page.reload();
    await page.evaluate(() => {
      for (const details of document.querySelectorAll('details')) details.open = true;
    });
    const { violations } = await new AxeBuilder({ page })
      .withTags(['wcag2a', 'wcag2aa', 'wcag22aa'])
      .analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
    expect(foreign).toEqual([]);
    await page.context().close();
  });
});
