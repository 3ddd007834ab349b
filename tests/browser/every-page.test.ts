import AxeBuilder from '@axe-core/playwright';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from '../support/browser';
import { root } from '../support/scripts';
import { demoAccounts } from '../support/sign-in';
import { signedIn } from '../support/signed-in';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** The pages of the built application, as its own manifest lists them. */
interface Manifest {
  readonly staticRoutes: readonly { readonly page: string; readonly regex: string }[];
  readonly dynamicRoutes: readonly { readonly page: string; readonly regex: string }[];
}
/** Downloads, which the manifest does not tell from pages. */
const downloads = ['/demo-files/[name]'];
const manifest = JSON.parse(readFileSync(path.join(root, '.next/routes-manifest.json'), 'utf8')) as Manifest;
const pages = [...manifest.staticRoutes, ...manifest.dynamicRoutes]
  .filter(({ page }) => !page.startsWith('/api/') && !page.startsWith('/_') && !downloads.includes(page))
  .map(({ page, regex }) => ({ page, pattern: new RegExp(regex) }));

/** The page that answers at an address: one address of each is opened. */
function kindOf(address: string): string {
  const { pathname } = new URL(address);
  return pages.find(({ pattern }) => pattern.test(pathname))?.page ?? pathname;
}

/** Addresses of pages that a page links to: not of downloads, nor of the HTTP interface. */
const linksOf = (page: Page): Promise<readonly string[]> =>
  page.$$eval('a[href]:not([download])', (anchors) =>
    anchors
      .map((anchor) => (anchor as HTMLAnchorElement).href.replace(/#.*$/, ''))
      .filter(
        (href) => href.startsWith(`${location.origin}/`) && !href.startsWith(`${location.origin}/api/`),
      ),
  );

interface Crawl {
  readonly kinds: readonly string[];
  readonly faults: readonly string[];
}

/** Opens one page of each kind that links lead to, beginning with the first page, and looks at each. */
async function crawl(page: Page, look: (kind: string) => Promise<readonly string[]>): Promise<Crawl> {
  const faults: string[] = [];
  let kind = '';
  page.on('console', (message) => {
    if (message.type() === 'error')
      faults.push(`${kind}: console: ${message.text()} ${message.location().url}`);
  });
  page.on('pageerror', (error) => faults.push(`${kind}: error: ${error.message}`));
  page.on('requestfailed', (request) => {
    // A page that is left does not wait for what it had begun to load.
    if (request.failure()?.errorText !== 'net::ERR_ABORTED') faults.push(`${kind}: failed: ${request.url()}`);
  });
  const waiting = new Map<string, string>();
  const seen = new Set<string>();
  const add = (address: string): void => {
    if (!seen.has(kindOf(address)) && !waiting.has(kindOf(address))) waiting.set(kindOf(address), address);
  };
  add(new URL('/', page.url()).href);
  for (const [next, address] of waiting) {
    waiting.delete(next);
    seen.add(next);
    kind = next;
    const answer = await page.goto(address, { waitUntil: 'load' });
    if (!answer?.ok()) faults.push(`${kind}: answered ${answer?.status()} at ${address}`);
    await page.locator('main').first().waitFor();
    faults.push(...(await look(kind)).map((fault) => `${kind}: ${fault}`));
    (await linksOf(page)).forEach(add);
  }
  return { kinds: [...seen], faults };
}

const looked = new Set<string>();

/** What assistive technology, a narrow screen or a reader of the heading would miss; once for each kind of page. */
async function lookAt(page: Page, kind: string): Promise<readonly string[]> {
  if (looked.has(kind)) return [];
  looked.add(kind);
  const faults: string[] = [];
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
    .analyze();
  for (const { id, nodes } of violations) faults.push(`${id}: ${nodes[0]?.html.slice(0, 200)}`);
  if ((await page.locator('h1').count()) !== 1) faults.push('has not exactly one first heading');
  await page.setViewportSize({ width: 390, height: 844 });
  const width = await page.evaluate(() => document.documentElement.scrollWidth);
  if (width > 390) faults.push(`is ${width} px wide on a screen of 390 px`);
  await page.setViewportSize({ width: 1280, height: 900 });
  return faults;
}

/** Reached otherwise than by a link of a person who is signed in. */
const elsewhere = ['/sign-in', '/welcome/[token]'];

describe('every page that links lead to', () => {
  it.each(demoAccounts)(
    'opens without a fault for %s',
    async (account) => {
      const page = await signedIn(browser, account);
      const { kinds, faults } = await crawl(page, (kind) => lookAt(page, kind));
      await page.context().close();
      expect(faults).toEqual([]);
      expect(kinds.length).toBeGreaterThan(3);
    },
    240_000,
  );

  it('is every page there is: none is out of everybody’s reach', () => {
    expect(
      pages.map(({ page }) => page).filter((page) => !looked.has(page) && !elsewhere.includes(page)),
    ).toEqual([]);
  });
});
