'use server';

import type { Route } from 'next';
import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { lightCookie, lightCookieAge_s } from '@/lib/contracts/light';
import { SignIn } from '@/lib/contracts/sign-in';
import { signIn } from '@/lib/server/acts/sign-in';
import { openFormAction } from '@/lib/server/http/action';
import { localPath } from '@/lib/server/identity/local-path';
import { readSessionCookie, setSessionCookie } from '@/lib/server/identity/session-cookie';

const enter = openFormAction(SignIn, async (visitor, { email, password, next }) => {
  const { cookie, light } = await signIn(visitor, { email, password }, await readSessionCookie());
  await setSessionCookie(cookie);
  // A light chosen in this browser stays: it may be dark where the person stands.
  const jar = await cookies();
  if (!jar.has(lightCookie)) {
    jar.set(lightCookie, light, { maxAge: lightCookieAge_s, sameSite: 'lax', path: '/' });
  }
  redirect(localPath(next) as Route);
});

type Result = Awaited<ReturnType<typeof enter>>;

/** Signs in and goes on to where the person was going. */
export async function signInAction(former: Result | null, form: FormData): Promise<Result> {
  return enter(former, form);
}
