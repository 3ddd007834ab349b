import 'server-only';
import { randomUUID } from 'node:crypto';
import type { Route } from 'next';
import { cookies, headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { cache } from 'react';
import { pathHeader } from '@/lib/contracts/path-header';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { toCaller } from './caller';
import { localPath } from './local-path';
import { personOfSession, sessionCookieIn, sessionCookieName } from './sessions';
import { bearerTokenIn, personOfToken } from './tokens';

/** Who asks through the HTTP interface: by API token if there is an Authorization header, else by session cookie. */
export async function callerFromRequest(request: Request): Promise<PersonCaller | null> {
  const requestId = randomUUID();
  const token = bearerTokenIn(request.headers.get('authorization'));
  if (token !== null) {
    const found = await personOfToken(token);
    return found && toCaller(found.person, { via: 'token', scopes: found.scopes, requestId });
  }
  return callerFromCookie(sessionCookieIn(request.headers.get('cookie')), requestId);
}

async function callerFromCookie(cookie: string | null, requestId: string): Promise<PersonCaller | null> {
  if (cookie === null || cookie === '') return null;
  const person = await personOfSession(cookie);
  return person && toCaller(person, { via: 'session', requestId });
}

/** Who looks at a page or sends a form; asked once a request. */
export const currentCaller = cache(async (): Promise<PersonCaller | null> => {
  const cookie = (await cookies()).get(sessionCookieName)?.value ?? null;
  return callerFromCookie(cookie, randomUUID());
});

/** Who looks at a page; whoever is not signed in is sent to the door and comes back afterwards. */
export async function callerOrSignIn(): Promise<PersonCaller> {
  const caller = await currentCaller();
  if (caller) return caller;
  const path = localPath((await headers()).get(pathHeader));
  const door = path === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(path)}`;
  redirect(door as Route);
}
