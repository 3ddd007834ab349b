import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../support/browser';
import { signedIn } from '../support/signed-in';

let browser: Browser;
let page: Page;
beforeAll(async () => {
  browser = await launchBrowser();
  page = await signedIn(browser, 'observer');
  page.setDefaultTimeout(10_000);
  await page.goto('/nights');
  await page.getByLabel('Evening date').fill('2026-10-12');
  await page.getByRole('button', { name: 'Open the night' }).click();
  await page.waitForURL(/\/nights\/[0-9a-z]{12}$/);
  await page.getByRole('slider').waitFor();
});
afterAll(() => browser.close());

const line = () => page.getByRole('form', { name: 'Log a frame' });
const waiting = () =>
  page.locator('section', { has: page.getByRole('heading', { name: 'Waiting to be sent' }) });
const rows = () => page.getByRole('table', { name: 'Frames, the latest first' }).locator('tbody tr');
const allSent = () => waiting().getByText('Nothing. Every entry is with the server.').waitFor();
const numbers = async () => (await rows().locator('th').allTextContents()).map(Number);

describe('an observer at the keyboard', () => {
  it('opens a night and finds an empty log that says what belongs there', async () => {
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toBe('12 October 2026');
    await page.getByText('No frames yet').first().waitFor();
  });

  it('logs ten frames without a mouse', async () => {
    await page.keyboard.press('Escape');
    await page.keyboard.press('l');
    await page.keyboard.type('thistle');
    await page.keyboard.press('Enter');
    expect(await line().getByLabel('Object').inputValue()).toBe('Thistle 3');
    expect(await line().getByLabel('Type').inputValue()).toBe('target');
    await page.keyboard.press('Tab');
    await page.keyboard.type('b');
    await page.keyboard.press('Tab');
    await page.keyboard.type('2200');
    await page.keyboard.press('Tab');
    await page.keyboard.type('60');
    await page.keyboard.press('Enter');
    await rows().first().waitFor();
    for (let frame = 2; frame <= 10; frame += 1) await page.keyboard.press('Enter');
    await allSent();
    expect(await numbers()).toEqual([10, 9, 8, 7, 6, 5, 4, 3, 2, 1]);
    expect(await rows().last().textContent()).toMatch(
      /target.*Thistle 3.*B.*22:00:30.*60.*\d\.\d{3}.*MH26B-04/,
    );
  });

  it('is told what is wrong beside the field, and loses nothing of what was typed', async () => {
    await line().getByLabel('Exposure').fill('12,5');
    await line().getByLabel('Comment').fill('thin cloud');
    await page.keyboard.press('Enter');
    await line().getByText('is not a number: write 12.5').waitFor();
    expect(await line().getByLabel('Comment').inputValue()).toBe('thin cloud');
    await line().getByLabel('Exposure').fill('12.5');
    await page.keyboard.press('Enter');
    await allSent();
    expect(await rows().first().textContent()).toContain('thin cloud');
  });

  it('goes on over a dead link; what was logged is kept over a reload and sent once when the link is back', async () => {
    const before = await rows().count();
    // The link to the interface is cut; the page itself can still be loaded, as after a reload from elsewhere.
    await page.route('**/api/v1/**', (route) => route.abort('internetdisconnected'));
    await line().getByLabel('Object').focus();
    await page.keyboard.press('Enter');
    await page.keyboard.press('Enter');
    await waiting().getByText('The server cannot be reached').waitFor();
    expect(await rows().filter({ hasText: 'waiting to be sent' }).count()).toBe(2);
    await page.reload();
    await waiting().getByText('The server cannot be reached').waitFor();
    expect(await rows().filter({ hasText: 'waiting to be sent' }).count()).toBe(2);
    await page.unroute('**/api/v1/**');
    await waiting().getByRole('button', { name: 'Try now' }).click();
    await allSent();
    expect(await rows().count()).toBe(before + 2);
  });

  it('logs once what arrived though its answer was lost', async () => {
    const before = await rows().count();
    let cut = 0;
    await page.route('**/frames', async (route) => {
      if (route.request().method() !== 'POST' || cut > 0) return route.continue();
      cut += 1;
      // The server gets it; the answer never comes back.
      await route.fetch();
      return route.abort('connectionreset');
    });
    await line().getByLabel('Object').focus();
    await page.keyboard.press('Enter');
    await waiting().getByText('The server cannot be reached').waitFor();
    await waiting().getByRole('button', { name: 'Try now' }).click();
    await allSent();
    await page.unroute('**/frames');
    await page.reload();
    expect(cut).toBe(1);
    expect(await rows().count()).toBe(before + 1);
  });

  it('gets a refused frame back into the line with the reason', async () => {
    await line().getByLabel('Frame').fill('1');
    await page.keyboard.press('Enter');
    const notice = page.getByRole('alert').filter({ hasText: 'Not logged: Frame 1' });
    await notice.getByText('is the number of a frame in the log').waitFor();
    await notice.getByRole('button', { name: 'Put back into the line' }).click();
    await line().getByText('is the number of a frame in the log').waitFor();
    await line().getByLabel('Frame').fill('50');
    await page.keyboard.press('Enter');
    await allSent();
    expect(await numbers()).toContain(50);
  });

  it('adds conditions at a key, and sees them in the panel and on the band', async () => {
    await page.keyboard.press('Escape');
    await page.keyboard.press('c');
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Cloud').fill('9');
    await dialog.getByLabel('Time').fill('22:30');
    await page.keyboard.press('Enter');
    await dialog.getByText('must be 0 to 8 eighths').waitFor();
    await dialog.getByLabel('Cloud').fill('2');
    await page.keyboard.press('Enter');
    await allSent();
    await page.getByText('last 22:30').waitFor();
    expect(await page.locator('[role=slider] text', { hasText: '2/8' }).count()).toBe(1);
  });

  it('selects a stretch by keyboard; the table follows, and the address keeps it', async () => {
    await page.getByRole('slider').focus();
    await page.keyboard.press('Home');
    await page.keyboard.press('Shift+End');
    await page.getByLabel(/Only the \d+ frames of the selected stretch/).waitFor();
    expect(page.url()).toMatch(/\?from=2026-10-12T\d\d:\d\d:00Z&to=2026-10-13T\d\d:\d\d:00Z$/);
    await page.reload();
    // The address is read once the page's script runs.
    await page.getByLabel(/Only the \d+ frames/).waitFor();
    await page.getByRole('button', { name: 'Clear' }).click();
    await page.waitForURL(({ search }) => !search.includes('from='));
  });

  it('corrects a frame in place; the earlier value stays in the audit trail', async () => {
    await page.getByRole('button', { name: 'Correct frame 50' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Exposure').fill('44');
    await dialog.getByLabel('Reason').fill('mistyped');
    await dialog.getByRole('button', { name: 'Save the correction' }).click();
    await dialog.waitFor({ state: 'hidden' });
    const row = rows().filter({ has: page.locator('th', { hasText: /^50$/ }) });
    expect(await row.textContent()).toContain('44');
    await row.getByRole('link', { name: 'corrected' }).click();
    await page.getByText('mistyped').waitFor();
    await page.goBack();
  });

  it('logs a pasted table, all or none, with every fault on its line', async () => {
    await page.getByRole('slider').waitFor();
    await page.getByRole('button', { name: /^Many/ }).click();
    const dialog = page.getByRole('dialog');
    const table = dialog.getByLabel('Table of frames');
    await table.fill('number,type,band,start,exposure\n60,bias,,15:00,0\n61,flat,V,15:05,x');
    await dialog.getByText('1 of 2 lines have faults').waitFor();
    expect(await dialog.getByRole('button', { name: /^Log/ }).isDisabled()).toBe(true);
    await table.fill('number,type,band,start,exposure\n60,bias,,15:00,0\n61,flat,V,15:05,3');
    await dialog.getByRole('button', { name: 'Log 2 frames' }).click();
    await dialog.waitFor({ state: 'hidden' });
    expect(await numbers()).toEqual(expect.arrayContaining([60, 61]));
  });

  it('reads FITS headers in the browser and logs their frames', async () => {
    const cards = [
      'SIMPLE  =                    T',
      'BITPIX  =                   16',
      'NAXIS   =                    0',
      "OBJECT  = 'Thistle 3'",
      "IMAGETYP= 'Light Frame'",
      "FILTER  = 'V'",
      "DATE-OBS= '2026-10-12T23:10:00'",
      'EXPTIME =                 60.0',
      'END',
    ];
    const header = cards
      .map((card) => card.padEnd(80))
      .join('')
      .padEnd(2880);
    await page.getByRole('button', { name: /^Many/ }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('FITS files').setInputFiles({
      name: 'n1012_0062.fits',
      mimeType: 'application/fits',
      buffer: Buffer.from(header, 'latin1'),
    });
    await dialog.getByRole('button', { name: 'Log 1 frames' }).click();
    await dialog.waitFor({ state: 'hidden' });
    const row = rows().filter({ has: page.locator('th', { hasText: /^62$/ }) });
    expect(await row.textContent()).toMatch(/target.*Thistle 3.*V.*23:10:30.*60/);
  });

  it('closes the night with an account, and opens it again with a reason', async () => {
    await page.getByRole('button', { name: 'Close night' }).click();
    await page.getByLabel('Account of the night').fill('Thin cloud until midnight.');
    await page.getByRole('dialog').getByRole('button', { name: 'Close the night' }).click();
    await page.getByText('Closed by Noor Hathaway').waitFor();
    expect(await line().count()).toBe(0);
    await page.getByRole('button', { name: 'Open again' }).click();
    await page.getByLabel('Reason').fill('two flats missing');
    await page.getByRole('dialog').getByRole('button', { name: 'Open it again' }).click();
    await page.getByText('Opened again: two flats missing').waitFor();
    await line().waitFor();
  });
});
