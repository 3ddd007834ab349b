import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { starFiles } from '@/db/seeders/demo/demo-nights';
import { readTable } from '@/db/seeders/fixture-files';
import { execute, selectOne } from '@/lib/server/data/database';
import { launchBrowser } from '../support/browser';
import { expectDarkOnScreens } from '../support/expect-dark';
import { signedIn } from '../support/signed-in';

let browser: Browser;
/** Address of the results of the demo's approved night. */
let address: string;
const programme = 'MH26B-04';

/** The night that the demo's photometrists have approved; nobody has looked at its results yet. */
beforeAll(async () => {
  browser = await launchBrowser();
  const night = await selectOne<{ id: string }>(
    `SELECT public_id AS id FROM nights WHERE date = '2026-10-17' AND state = 'calibrated'`,
    {},
  );
  if (!night) throw new Error('The demo has no calibrated night.');
  address = `/nights/${night.id}/results`;
  await execute('DELETE FROM seen_results', {}, null);
});
afterAll(() => browser.close());

const rows = (page: Page): Locator =>
  page.getByRole('table', { name: 'Calibrated magnitudes' }).locator('tbody tr');
const dots = (page: Page): Locator => page.locator('[data-star]');

describe('the results of a night', () => {
  it('wait for the investigator on the first page until they are opened', async () => {
    const page = await signedIn(browser, 'pi');
    await page.goto('/');
    const waiting = page.getByRole('region', { name: 'Waiting for you' });
    const link = waiting.getByRole('link', { name: new RegExp(`${programme}, 17 October 2026`) });
    await link.click();
    await page.waitForURL(/\/results\?programme=/);
    await rows(page).first().waitFor();
    await expect
      .poll(async () => (await selectOne('SELECT person_id FROM seen_results LIMIT 1', {})) !== null)
      .toBe(true);
    await page.goto('/');
    await page.getByRole('heading', { level: 1 }).waitFor();
    expect(await link.count()).toBe(0);
    await page.context().close();
  });

  it('open by V, are narrowed and paged on the server, and chosen in the diagram', async () => {
    const page = await signedIn(browser, 'pi');
    await page.goto(`${address}?programme=${programme}`);
    expect(await rows(page).count()).toBe(100);
    await page.getByText(/^7\d\d of 7\d\d stars, by V$/).waitFor();
    await page.getByRole('link', { name: 'Next' }).click();
    await page.waitForURL(/page=2/);
    await page.getByText(/Stars 101 to 200 of 7\d\d/).waitFor();
    // The faintest star stands on another page: its point leads there.
    const faintest = await dots(page).evaluateAll((all) =>
      all
        .toSorted((a, b) => Number(b.getAttribute('cy')) - Number(a.getAttribute('cy')))[0]
        ?.getAttribute('data-star'),
    );
    // Points lie on one another where stars are many: the click is the point's own.
    await page.locator(`[data-star="${faintest}"]`).dispatchEvent('click');
    await page.waitForURL(/at=/);
    const chosen = page.locator(`#star-${faintest}`);
    await chosen.waitFor();
    expect(await chosen.getAttribute('aria-selected')).toBe('true');
    await page.getByLabel('Without cautions').check();
    await page.getByRole('button', { name: 'Show', exact: true }).click();
    await page.waitForURL(/clean=1/);
    await page.getByText(/^[5-6]\d\d of 7\d\d stars, by V$/).waitFor();
    await page.context().close();
  });

  it('agree with the truth of the simulation to within what their errors say', async () => {
    const stars = await readTable<'name' | 'V'>(starFiles['Thistle 3']);
    const truth = new Map(stars.map(({ name, V }) => [name, Number(V)]));
    const page = await signedIn(browser, 'pi');
    await page.goto(`${address}?programme=${programme}&star=T3-1&v_from=13&v_to=16&clean=1`);
    await rows(page).first().waitFor();
    const shown = await rows(page).evaluateAll((all) =>
      all.map((row) => ({
        star: row.querySelector('th')?.textContent.trim() ?? '',
        V: row.querySelector('td')?.textContent ?? '',
      })),
    );
    const pulls = shown.map(({ star, V }) => {
      const [value = NaN, error = NaN] = V.split('±').map(Number);
      return (value - (truth.get(star) ?? NaN)) / error;
    });
    expect(pulls.length).toBeGreaterThan(20);
    expect(Math.max(...pulls.map(Math.abs))).toBeLessThan(5);
    await page.context().close();
  });

  it('of another programme are nowhere to be found', async () => {
    const page = await signedIn(browser, 'coinvestigator');
    const answer = await page.goto(`${address}?programme=${programme}`);
    expect(answer?.status()).toBe(404);
    await page.goto(`${address}`);
    await rows(page).first().waitFor();
    expect(await page.getByText('T3-').count()).toBe(0);
    await page.context().close();
  });

  it('light nothing but red in Dark site, also on a phone, and are not wider than it', async () => {
    const page = await signedIn(browser, 'pi');
    await page.getByRole('button', { name: 'Dark site' }).click();
    await page.goto(`${address}?programme=${programme}`, { waitUntil: 'networkidle' });
    await dots(page).first().dispatchEvent('click');
    await expectDarkOnScreens(page);
    await page.context().close();
  });
});
