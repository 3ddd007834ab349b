import type { Browser, Page } from 'playwright-core';

export const demoAccounts = [
  'manager',
  'photometrist',
  'photometrist2',
  'observer',
  'pi',
  'coinvestigator',
] as const;
export type DemoAccount = (typeof demoAccounts)[number];

export interface Door {
  /** Address of the running demo. */
  readonly baseUrl: string;
  readonly password: string;
  readonly size?: { readonly width: number; readonly height: number };
}

/** A page of a browser profile of its own in which a demo account is signed in; close its context after use. */
export async function signIn(browser: Browser, account: DemoAccount, door: Door): Promise<Page> {
  const context = await browser.newContext({
    baseURL: door.baseUrl,
    viewport: door.size ?? { width: 1280, height: 900 },
  });
  const page = await context.newPage();
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(`${account}@evenfall.example`);
  await page.getByLabel('Password').fill(door.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
  return page;
}
