import path from 'node:path';
import type { Browser } from 'playwright-core';
import { lightCookie } from '@/lib/contracts/light';
import { launchBrowser } from '@/tests/support/browser';
import { root } from '@/tests/support/scripts';
import { signIn } from '@/tests/support/sign-in';
import { pictures, type Picture } from './pictures';

const baseUrl = process.env['BASE_URL'] ?? `http://127.0.0.1:${process.env['PORT'] ?? '3000'}`;
const password = process.env['DEMO_PASSWORD'] ?? 'evenfall-demo';
const size = { width: 1280, height: 800 };

async function take(browser: Browser, { name, account, light, open }: Picture): Promise<void> {
  const page = await signIn(browser, account, { baseUrl, password, size });
  await page.context().addCookies([{ name: lightCookie, value: light, url: baseUrl }]);
  await open(page);
  await page.waitForLoadState('networkidle');
  const file = path.join('public/tour', `${name}.png`);
  await page.screenshot({ path: path.join(root, file), animations: 'disabled' });
  await page.context().close();
  console.log(`${file}: ${page.url()}`);
}

/** Takes the pictures of the README's tour from a running demo: all, or those named. */
async function main(names: readonly string[]): Promise<void> {
  const unknown = names.filter((name) => !pictures.some((picture) => picture.name === name));
  if (unknown.length > 0) {
    throw new Error(
      `There is no picture ${unknown.join(', ')}; there are ${pictures.map(({ name }) => name).join(', ')}.`,
    );
  }
  const browser = await launchBrowser();
  try {
    for (const picture of pictures) {
      if (names.length === 0 || names.includes(picture.name)) await take(browser, picture);
    }
  } finally {
    await browser.close();
  }
}

await main(process.argv.slice(2));
