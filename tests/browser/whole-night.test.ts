import { readFile } from 'node:fs/promises';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { FrameInput } from '@/lib/contracts/api/frame';
import { launchBrowser } from '../support/browser';
import { signedIn } from '../support/signed-in';
import { expectTruth, readCalibrated, walkNight, type WalkNight } from '../support/walk-night';

let browser: Browser;
let night: WalkNight;
/** Address of the night, once it is open. */
let address: string;
const faults: string[] = [];
const patience = { timeout: 60_000 };

beforeAll(async () => {
  night = await walkNight('2026-10-13', 20261013);
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** A page of one of the four people; what its console complains of fails the walk. */
async function pageOf(account: Parameters<typeof signedIn>[1]): Promise<Page> {
  const page = await signedIn(browser, account);
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(message.text());
  });
  return page;
}

const columns = ['number', 'type', 'object', 'band', 'start', 'exposure', 'file', 'programme', 'ra', 'dec'];
const lineOf = (frame: FrameInput): string =>
  [
    frame.number,
    frame.type,
    frame.object,
    frame.band,
    frame.utc_start,
    frame.exposure,
    frame.file,
    frame.programme,
    frame.ra,
    frame.dec,
  ]
    .map((cell) => cell ?? '')
    .join(',');

async function upload(page: Page, kind: 'standard' | 'target', table: string): Promise<void> {
  await page.goto(`${address}/measurements`);
  const form = page.getByRole('form', { name: 'Upload a measurement table' });
  await page
    .getByLabel('File of the table')
    .setInputFiles({ name: `${kind}s.csv`, mimeType: 'text/csv', buffer: Buffer.from(table) });
  await form.getByLabel('Its rows are').selectOption(kind);
  await form.getByRole('button', { name: 'Upload', exact: true }).click();
  const link = page.getByRole('link', { name: `${kind}s.csv`, exact: true });
  await page.getByRole('row').filter({ has: link }).getByText('matched').waitFor(patience);
}

describe('a night from its first frame to the magnitudes that its investigator downloads', () => {
  it('the observer opens the night, logs its frames, uploads both tables and closes it', async () => {
    const page = await pageOf('observer');
    await page.goto('/nights');
    const form = page.getByRole('form', { name: 'Open a night' });
    await form.getByLabel('Telescope').selectOption('larkspur');
    await form.getByLabel('Evening date').fill(night.date);
    await form.getByRole('button', { name: 'Open the night' }).click();
    await page.waitForURL(/\/nights\/[0-9a-z]{12}$/, patience);
    address = new URL(page.url()).pathname;

    await page.getByRole('button', { name: /^Many/ }).click();
    const many = page.getByRole('dialog');
    await many
      .getByLabel('Table of frames')
      .fill([columns.join(','), ...night.frames.map(lineOf)].join('\n'));
    await many.getByText(`${night.frames.length} frames, nothing wrong.`).waitFor(patience);
    await many.getByRole('button', { name: `Log ${night.frames.length} frames` }).click();
    await many.waitFor({ state: 'detached', ...patience });

    await upload(page, 'standard', night.standards);
    await upload(page, 'target', night.targets);
    await page.getByRole('button', { name: 'Close night' }).click();
    await page.getByRole('dialog').getByRole('button', { name: 'Close the night' }).click();
    await page.getByRole('dialog').waitFor({ state: 'detached', ...patience });
    await page.getByText('closed', { exact: true }).first().waitFor(patience);
    expect(await page.getByRole('button', { name: 'Close night' }).count()).toBe(0);
    await page.context().close();
  });

  it('the photometrist solves it, sees the evidence and proposes the solution', async () => {
    const page = await pageOf('photometrist');
    await page.goto(`${address}/solutions`);
    await page.getByRole('button', { name: 'Solve', exact: true }).click();
    await page
      .getByRole('heading', { level: 1, name: /^Solution 1, night of 13 October 2026/ })
      .waitFor(patience);
    const propose = page.getByRole('button', { name: 'Propose for approval' });
    await propose.waitFor(patience);
    await page.getByText('suggests photometric').first().waitFor(patience);
    await propose.click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Comment').fill('Residuals without structure.');
    await dialog.getByRole('button', { name: 'Propose', exact: true }).click();
    await dialog.waitFor({ state: 'detached', ...patience });
    expect(await page.getByRole('button', { name: 'Approve', exact: true }).count()).toBe(0);
    await page.context().close();
  });

  it('another photometrist approves it', async () => {
    const page = await pageOf('photometrist2');
    await page.goto(`${address}/solutions`);
    await page
      .getByRole('link', { name: /Solution 1|^1$/ })
      .first()
      .click();
    await page.getByRole('button', { name: 'Approve', exact: true }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Comment').fill('Agreed.');
    await dialog.getByRole('button', { name: 'Approve', exact: true }).click();
    await dialog.waitFor({ state: 'detached', ...patience });
    await page.getByText('approved', { exact: true }).first().waitFor(patience);
    expect(await page.getByRole('button', { name: 'Approve', exact: true }).count()).toBe(0);
    await page.context().close();
  });

  it('the investigator downloads magnitudes that agree with the truth of the simulation', async () => {
    const page = await pageOf('pi');
    await page.goto(`${address}/results`);
    const link = page.getByRole('link', { name: 'CSV', exact: true });
    await link.waitFor(patience);
    const [download] = await Promise.all([page.waitForEvent('download'), link.click()]);
    const text = await readFile(await download.path(), 'utf8');
    expect(text.startsWith('#')).toBe(true);
    expectTruth(readCalibrated(text), night);
    await page.context().close();
  });

  it('the investigator was told by one mail', async () => {
    const page = await pageOf('manager');
    const mails = page
      .getByRole('row')
      .filter({ hasText: 'pi@evenfall.example' })
      .filter({ hasText: '13 October 2026' });
    await expect
      .poll(async () => {
        await page.goto('/mail');
        return mails.count();
      }, patience)
      .toBeGreaterThan(0);
    await mails.first().getByRole('link').click();
    const text = await page.getByText('photometric').first().textContent();
    expect(text).toContain('photometric');
    await page.context().close();
  });

  it('no page complained on its console', () => {
    expect(faults).toEqual([]);
  });
});
