import { readFile } from 'node:fs/promises';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { fixturePath } from '@/db/seeders/fixture-files';
import { launchBrowser } from '../support/browser';
import { signedIn } from '../support/signed-in';

let browser: Browser;
let page: Page;
beforeAll(async () => {
  browser = await launchBrowser();
  page = await signedIn(browser, 'observer');
});
afterAll(() => browser.close());

describe('the sample files of the demo', () => {
  it('are listed, those of the night in progress too, and each can be downloaded', async () => {
    await page.goto('/demo-files');
    const links = await page
      .locator('a[download]')
      .evaluateAll((all) => all.map((a) => (a as HTMLAnchorElement).href));
    expect(links.length).toBeGreaterThanOrEqual(9);
    expect(links.some((link) => link.endsWith('/tonight-standards.csv'))).toBe(true);
    for (const link of links) {
      const answer = await page.request.get(link);
      expect(answer.status()).toBe(200);
      expect(answer.headers()['content-disposition']).toContain('attachment');
      expect(await answer.text()).toContain('Simulated for the demonstration');
    }
  });

  it('come byte for byte', async () => {
    const name = '2026-11-03-standards-faulty.csv';
    const answer = await page.request.get(`/demo-files/${name}`);
    expect(Buffer.compare(await answer.body(), await readFile(fixturePath(`uploads/${name}`)))).toBe(0);
  });

  it.each(['package.json', '..%2F..%2Fpackage.json', '..%2Fdemo%2Fobservatory.json', 'no-such-file.csv'])(
    'nothing else is given out: not %s',
    async (name) => {
      const answer = await page.request.get(`/demo-files/${name}`);
      expect(answer.status()).toBe(404);
    },
  );

  it('nor anything to people who are not signed in', async () => {
    const answer = await fetch(`${inject('baseUrl')}/demo-files/2026-11-03-standards.csv`, {
      redirect: 'manual',
    });
    expect(answer.status).toBe(404);
  });
});
