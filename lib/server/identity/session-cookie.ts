import 'server-only';
import { cookies } from 'next/headers';
import { lucia, sessionCookieName } from './sessions';

/** The session cookie's value in this request, or null. */
export async function readSessionCookie(): Promise<string | null> {
  return (await cookies()).get(sessionCookieName)?.value ?? null;
}

/** Hands the browser a session. Only within an action or a route handler. */
export async function setSessionCookie(value: string): Promise<void> {
  const cookie = lucia().createSessionCookie(value);
  (await cookies()).set(cookie.name, cookie.value, cookie.attributes);
}

/** Takes the session back from the browser. Only within an action or a route handler. */
export async function clearSessionCookie(): Promise<void> {
  const cookie = lucia().createBlankSessionCookie();
  (await cookies()).set(cookie.name, cookie.value, cookie.attributes);
}
