import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { launchBrowser } from '../support/browser';
import { expectDark } from '../support/expect-dark';
import type { DemoAccount } from '../support/sign-in';
import { signedIn } from '../support/signed-in';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

async function inDarkSite(account: DemoAccount): Promise<Page> {
  const page = await signedIn(browser, account);
  await page.context().addCookies([{ name: 'light', value: 'dark-site', url: inject('baseUrl') }]);
  return page;
}

const openNight = async (page: Page): Promise<void> => {
  await page.goto('/');
  await page
    .getByRole('link', { name: /Continue the log|See the log/ })
    .first()
    .click();
  // Tonight shows a band for each telescope: only the night's own page has one alone.
  await page.waitForURL(/\/nights\/[0-9a-z]{12}/);
  await page.getByRole('slider').waitFor();
};

describe('in Dark site no pixel has green or blue in it', () => {
  it('on every page of the bar', async () => {
    const page = await inDarkSite('manager');
    await page.goto('/');
    const places = await page.$$eval('header nav:first-of-type a', (links) =>
      links.map((link) => link.getAttribute('href') ?? ''),
    );
    expect(places.length).toBeGreaterThan(3);
    for (const place of places) {
      await page.goto(place, { waitUntil: 'networkidle' });
      await expectDark(page, place);
    }
    await page.context().close();
  });

  it('at the door, with an error and a filled field', async () => {
    const context = await browser.newContext({ baseURL: inject('baseUrl') });
    await context.addCookies([{ name: 'light', value: 'dark-site', url: inject('baseUrl') }]);
    const page = await context.newPage();
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').fill('nobody@evenfall.example');
    await page.getByLabel('Password').fill('wrong');
    await page.keyboard.press('Enter');
    await page.getByRole('alert').first().waitFor();
    await expectDark(page, 'the door');
    await context.close();
  });

  it('in the log: focus, suggestions, faults, dialogues, lists of choices, selected text and narrow screens', async () => {
    const page = await inDarkSite('observer');
    await openNight(page);
    await expectDark(page, 'the log');
    const line = page.getByRole('form', { name: 'Log a frame' });
    await line.getByLabel('Object').fill('t');
    await page.getByRole('option').first().waitFor();
    await expectDark(page, 'suggestions');
    await page.keyboard.press('Escape');
    await line.getByLabel('Exposure').fill('none');
    await page.keyboard.press('Enter');
    await line.getByText('is not a number').waitFor();
    await page.keyboard.press('Control+a');
    await expectDark(page, 'a fault and selected text');
    await page.getByRole('slider').focus();
    await page.keyboard.press('Shift+PageDown');
    await expectDark(page, 'a selected stretch');
    await page.getByRole('button', { name: 'Add conditions' }).click();
    await page.getByRole('dialog').waitFor();
    await expectDark(page, 'a dialogue');
    await page.keyboard.press('Escape');
    await page.goto('/nights');
    await page.getByLabel('State').first().click();
    await expectDark(page, 'a list of choices');
    await page.keyboard.press('Escape');
    await page.setViewportSize({ width: 360, height: 740 });
    await openNight(page);
    await page.getByText('Menu').click();
    await expectDark(page, 'a phone');
    await page.context().close();
  });

  it('at an address where nothing is', async () => {
    const page = await inDarkSite('pi');
    await page.goto('/nothing-here');
    await expectDark(page, 'not found');
    await page.context().close();
  });
});

describe('the light', () => {
  it('changes at once, without a reload, and is there again on the next page', async () => {
    const page = await signedIn(browser, 'pi');
    await page.getByRole('button', { name: 'Dark site' }).click();
    expect(await page.evaluate(() => document.documentElement.dataset['light'])).toBe('dark-site');
    expect(await page.locator('meta[name=theme-color]').getAttribute('content')).toMatch(/^#0+$/);
    await expectDark(page, 'the page as it stands');
    await page.goto('/nights');
    expect(await page.evaluate(() => document.documentElement.dataset['light'])).toBe('dark-site');
    await page.context().close();
  });

  it('changes without scripts too', async () => {
    const context = await browser.newContext({ baseURL: inject('baseUrl'), javaScriptEnabled: false });
    const page = await context.newPage();
    await page.goto('/sign-in');
    await page.getByRole('button', { name: 'Dusk' }).click();
    await page.waitForLoadState();
    expect(await page.locator('html').getAttribute('data-light')).toBe('dusk');
    await context.close();
  });
});
