import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { listFrames, type Frame } from '@/lib/contracts/api/frame';
import { execute, insert } from '@/lib/server/data/database';
import { callApi, demoToken } from '../support/api';
import { launchBrowser } from '../support/browser';

let browser: Browser;
let context: BrowserContext;
let page: Page;
const faults: string[] = [];

/** The demo's own night is open already: a second telescope's is not. */
beforeAll(async () => {
  const telescope = await insert(
    `INSERT INTO telescopes (site_id, code, name, aperture_m)
     SELECT id, 'sorrel', 'Sorrel 0.4 m', 0.4 FROM sites ORDER BY id LIMIT 1`,
    {},
    null,
  );
  await execute(
    `INSERT INTO filters (telescope_id, band, name, default_exposure)
     VALUES (:telescope, 'B', 'B of Sorrel', 120), (:telescope, 'V', 'V of Sorrel', 60)`,
    { telescope },
    null,
  );
  browser = await launchBrowser();
  context = await browser.newContext({ baseURL: inject('baseUrl'), viewport: { width: 1400, height: 1000 } });
  page = await context.newPage();
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error' && !message.text().includes('net::ERR')) faults.push(message.text());
  });
});
afterAll(() => browser.close());

const press = async (...keys: readonly string[]): Promise<void> => {
  for (const key of keys) await page.keyboard.press(key);
};

/** Tabs on until something with the name has the focus, as somebody without a mouse would. */
async function tabTo(name: string | RegExp): Promise<void> {
  for (let step = 0; step < 60; step += 1) {
    await press('Tab');
    const focused = await page.evaluate(() => document.activeElement?.textContent?.trim() ?? '');
    if (focused.match(name)) return;
  }
  throw new Error(`Nothing named ${String(name)} takes the focus.`);
}

const rows = () => page.getByRole('region', { name: 'Frames, the latest first' }).locator('tbody tr');
async function shownFrames(): Promise<readonly (readonly string[])[]> {
  return rows().evaluateAll((all) =>
    all.map((row) => [...row.children].slice(0, 6).map((cell) => cell.textContent?.trim() ?? '')),
  );
}
/** Waits until so many frames are shown and none of them is still on its way. */
async function logged(count: number): Promise<void> {
  await page.waitForFunction(
    (wanted) => {
      const shown = [...document.querySelectorAll('[aria-label="Frames, the latest first"] tbody tr')];
      return shown.length === wanted && !shown.some((row) => row.textContent?.includes('waiting to be sent'));
    },
    count,
    { timeout: 20_000 },
  );
}
const framesOfNight = async (): Promise<readonly Frame[]> => {
  const id = new URL(page.url()).pathname.split('/')[2] ?? '';
  const answer = await callApi(listFrames, { token: await demoToken('observer'), params: { id } });
  return (answer.body as { items: readonly Frame[] }).items;
};

describe('an observer’s night, by keyboard alone', () => {
  it('begins at the door, and opens tonight’s night', async () => {
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').focus();
    await page.keyboard.type('observer@evenfall.example');
    await press('Tab');
    await page.keyboard.type(inject('demoPassword'));
    await press('Enter');
    await page.waitForURL((url) => url.pathname === '/');
    await page.getByRole('heading', { name: 'Sorrel 0.4 m' }).waitFor();
    await tabTo(/^Open tonight’s night/);
    await press('Enter');
    await page.waitForURL(/\/nights\/[0-9a-z]{12}$/);
    await page.getByRole('paragraph').filter({ hasText: 'No frames yet' }).waitFor();
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toMatch(/^\d{1,2} \w+ \d{4}$/);
  });

  it('logs ten frames in alternating bands, most of them by one key', async () => {
    // The line is ready to type the object: its name completes, and it knows its programme.
    await page.waitForFunction(() => document.activeElement?.getAttribute('name') === 'object');
    await page.keyboard.type('thist');
    await page.getByRole('option', { name: /Thistle 3/ }).waitFor();
    await press('Tab');
    expect(await page.locator('[name=type]').inputValue()).toBe('target');
    await page.keyboard.type('B');
    await press('Tab');
    expect(await page.locator('[name=exposure]').inputValue()).toBe('120');
    await press('Enter');
    await logged(1);
    // The second is in V; with the third the line knows the sequence and goes on by itself.
    // The field keeps the focus with its text selected, ready to be typed over.
    await press('Shift+Tab');
    for (const band of ['V', 'B']) {
      await page.keyboard.type(band);
      await press('Enter');
    }
    await logged(3);
    for (let frame = 4; frame <= 10; frame += 1) await press('Enter');
    await logged(10);
    // Exposures that began within a second of each other stand by their middles: here they are looked at by number.
    const shown = [...(await shownFrames())].sort(([a], [b]) => Number(a) - Number(b));
    expect(shown).toEqual(
      Array.from({ length: 10 }, (_, index) => [
        String(index + 1),
        'target',
        'Thistle 3',
        expect.stringMatching(index % 2 ? /V$/ : /B$/),
        expect.stringMatching(/^\d\d:\d\d:\d\d$/),
        index % 2 ? '60' : '120',
      ]),
    );
  });

  it('has them in the log, with programme, geometry and the observer’s name', async () => {
    const frames = await framesOfNight();
    expect(frames.map(({ number }) => number)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    for (const frame of frames) {
      expect(frame).toMatchObject({
        object: 'Thistle 3',
        programme: 'MH26B-04',
        logged_by: 'Noor Hathaway',
        origin: 'log',
      });
      expect(frame.altitude).not.toBeNull();
      expect(Math.abs(Date.parse(frame.utc_start) - Date.now())).toBeLessThan(120_000);
    }
    await page.reload();
    await logged(10);
  });

  it('says what is wrong with a line, beside the field, and keeps what was typed', async () => {
    await page.locator('[name=band]').focus();
    await page.keyboard.type('Q');
    await press('Enter');
    await page.getByText('is none of U, B, V, R, I').waitFor();
    expect(await page.locator('[name=band]').inputValue()).toBe('Q');
    expect(await page.evaluate(() => document.activeElement?.getAttribute('name'))).toBe('band');
    await page.keyboard.press('Control+A');
    await page.keyboard.type('V');
    await press('Enter');
    await logged(11);
  });

  it('loses no frame to a dropped link or a reload, and logs each once', async () => {
    await context.setOffline(true);
    await page.locator('[name=band]').focus();
    await press('Enter', 'Enter', 'Enter');
    await page.getByText('waiting to be sent').nth(2).waitFor();
    await context.setOffline(false);
    await page.reload();
    await logged(14);
    expect((await framesOfNight()).map(({ number }) => number)).toEqual(
      Array.from({ length: 14 }, (_, i) => i + 1),
    );
  });

  it('has met no error on the way', () => {
    expect(faults).toEqual([]);
  });
});
