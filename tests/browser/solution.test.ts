import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { selectOne } from '@/lib/server/data/database';
import { launchBrowser } from '../support/browser';
import { expectDarkOnScreens } from '../support/expect-dark';
import { signedIn } from '../support/signed-in';

let browser: Browser;
/** Addresses of the draft that these tests solve for themselves, and of the one made from it. */
let draft: string;
let corrected: string;
const patience = { timeout: 60_000 };

const table = (page: Page): Locator => page.getByRole('table', { name: 'Observations of the solution' });
const rows = (page: Page): Locator => table(page).locator('tbody tr');
const rings = (page: Page): Locator => page.locator('[data-ring]');

/** The cloudy night of the demo, solved once more with the usual model. */
beforeAll(async () => {
  browser = await launchBrowser();
  const night = await selectOne<{ id: string }>(
    `SELECT public_id AS id FROM nights WHERE date = '2026-11-08'`,
    {},
  );
  const page = await signedIn(browser, 'photometrist');
  await page.goto(`/nights/${night?.id}/solutions`);
  await page.getByRole('button', { name: 'Solve', exact: true }).click();
  await rows(page).first().waitFor(patience);
  draft = new URL(page.url()).pathname;
  await page.context().close();
}, 120_000);
afterAll(() => browser.close());

async function openDraft(account: 'photometrist' | 'observer', address = draft): Promise<Page> {
  const page = await signedIn(browser, account);
  await page.goto(address);
  await rows(page).first().waitFor(patience);
  return page;
}

describe('a solution', () => {
  it('names the star that is not what its name says, and the bank of cloud', async () => {
    const page = await openDraft('photometrist');
    const findings = page.getByRole('list', { name: 'Findings' });
    await findings
      .getByText(/Star 92 425/)
      .first()
      .waitFor();
    await findings
      .getByText(/a bank of cloud is likely/)
      .first()
      .waitFor();
    expect(await page.getByText('suggests not photometric').count()).toBe(1);
    await page.context().close();
  });

  it('rings in every plot what is selected in the table, and the other way round', async () => {
    const page = await openDraft('photometrist');
    await rows(page).nth(2).getByRole('checkbox').check();
    await expect.poll(() => rings(page).count()).toBe(4);
    const plot = page.getByRole('slider', { name: /against Airmass/ });
    await plot.focus();
    await page.keyboard.press('Escape');
    expect(await table(page).getByRole('checkbox', { checked: true }).count()).toBe(0);
    await page.keyboard.press('End');
    await page.keyboard.press('Space');
    await page.getByRole('button', { name: /^selected 1/ }).click();
    expect(await rows(page).count()).toBe(1);
    await page.context().close();
  });

  it('is solved again as a new draft without what a photometrist rejects with a reason', async () => {
    const page = await openDraft('photometrist');
    await rows(page).nth(0).getByRole('checkbox').check();
    await rows(page).nth(1).getByRole('checkbox').check();
    // The focus is on the tick box: the key works from there.
    await page.keyboard.press('x');
    const dialog = page.getByRole('dialog', { name: 'Reject 2 observations' });
    await dialog.getByRole('button', { name: 'Reject and solve again' }).click();
    await dialog.getByText('Say why, in a few words').waitFor();
    await dialog.getByLabel('Why').fill('a satellite crossed the frame');
    await page.keyboard.press('Enter');
    await page.waitForURL((url) => url.pathname !== draft, patience);
    await page.getByText('draft', { exact: true }).first().waitFor(patience);
    await page.getByRole('button', { name: /^rejected \d/ }).click(patience);
    const reasons = rows(page).filter({ hasText: 'a satellite crossed the frame, by Bram Oyelaran' });
    await reasons.first().waitFor();
    expect(await reasons.count()).toBe(2);
    corrected = new URL(page.url()).pathname;
    await page.goto(draft);
    await rows(page).first().waitFor(patience);
    expect(await page.getByText('a satellite crossed the frame').count()).toBe(0);
    await page.context().close();
  });

  it('keeps in what a photometrist restores, whatever the fit thinks of it', async () => {
    const page = await openDraft('photometrist', corrected);
    await page.getByRole('button', { name: /^rejected \d/ }).click();
    const row = rows(page).filter({ hasText: 'a satellite crossed' }).first();
    await row.getByRole('checkbox').check();
    await page.keyboard.press('r');
    const dialog = page.getByRole('dialog', { name: 'Restore the observation' });
    await dialog.getByLabel('Why').fill('it was another frame');
    await dialog.getByRole('button', { name: 'Restore and solve again' }).click();
    await page.waitForURL((url) => url.pathname !== corrected, patience);
    const kept = rows(page).filter({ hasText: 'used: it was another frame, by Bram Oyelaran' });
    await kept.waitFor(patience);
    await page.getByRole('button', { name: /^rejected \d/ }).click();
    expect(await rows(page).filter({ hasText: 'a satellite crossed' }).count()).toBe(1);
    await page.getByRole('link', { name: 'Compare' }).click();
    const differing = page.getByRole('table', { name: 'Observations that differ' });
    await differing.getByText('rejected: a satellite crossed the frame').waitFor(patience);
    await page.context().close();
  });

  it('can be read by an observer of the night, who may neither reject, restore nor propose', async () => {
    const page = await openDraft('observer');
    await rows(page).nth(0).getByRole('checkbox').check();
    await page.keyboard.press('x');
    await page.keyboard.press('r');
    expect(await page.getByRole('dialog').count()).toBe(0);
    for (const name of [/^Reject/, /^Restore/, /^Propose/, /^Withdraw/, /^Approve/]) {
      expect(await page.getByRole('button', { name }).count()).toBe(0);
    }
    const refused = await page.request.post(`/api/v1${draft}/exclusions`, {
      headers: { origin: new URL(page.url()).origin },
      data: { observations: ['3kq8v7m2t0xc.1'], reason: 'no reason' },
    });
    expect(refused.status()).toBe(403);
    await page.context().close();
  });

  it('lights nothing but red in Dark site, also on a phone, and is not wider than it', async () => {
    const page = await openDraft('photometrist');
    await page.getByRole('button', { name: 'Dark site' }).click();
    await rows(page).nth(0).getByRole('checkbox').check();
    await expectDarkOnScreens(page);
    await page.context().close();
  });
});
