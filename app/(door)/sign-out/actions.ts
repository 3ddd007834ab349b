'use server';

import { redirect } from 'next/navigation';
import { z } from 'zod';
import { signOut } from '@/lib/server/acts/sign-out';
import { openFormAction } from '@/lib/server/http/action';
import { currentCaller } from '@/lib/server/identity/current-caller';
import { clearSessionCookie, readSessionCookie } from '@/lib/server/identity/session-cookie';

const leave = openFormAction(z.object({}), async ({ requestId }) => {
  const [caller, cookie] = await Promise.all([currentCaller(), readSessionCookie()]);
  // A session that has ended already leaves only its cookie to clear.
  if (caller && cookie) await signOut({ ...caller, requestId }, cookie);
  await clearSessionCookie();
  redirect('/sign-in');
});

type Result = Awaited<ReturnType<typeof leave>>;

/** Ends this browser's session for good. */
export async function signOutAction(former: Result | null, form: FormData): Promise<Result> {
  return leave(former, form);
}
