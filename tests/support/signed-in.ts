import type { Browser, Page } from 'playwright-core';
import { inject } from 'vitest';

export const demoAccounts = [
  'manager',
  'photometrist',
  'photometrist2',
  'observer',
  'pi',
  'coinvestigator',
] as const;
export type DemoAccount = (typeof demoAccounts)[number];

/** A page of a browser profile of its own in which a demo account is signed in; close its context after use. */
export async function signedIn(browser: Browser, account: DemoAccount): Promise<Page> {
  const context = await browser.newContext({
    baseURL: inject('baseUrl'),
    viewport: { width: 1280, height: 900 },
  });
  const page = await context.newPage();
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(`${account}@evenfall.example`);
  await page.getByLabel('Password').fill(inject('demoPassword'));
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
  return page;
}
