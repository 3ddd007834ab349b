import type { Browser, Page } from 'playwright-core';
import { inject } from 'vitest';
import { signIn, type DemoAccount } from './sign-in';

/** A page in which a demo account is signed in to the application under test; close its context after use. */
export function signedIn(browser: Browser, account: DemoAccount): Promise<Page> {
  return signIn(browser, account, { baseUrl: inject('baseUrl'), password: inject('demoPassword') });
}
