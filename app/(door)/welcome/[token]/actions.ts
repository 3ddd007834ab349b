'use server';

import type { Route } from 'next';
import { redirect } from 'next/navigation';
import { AcceptLink } from '@/lib/contracts/sign-in';
import { acceptLink } from '@/lib/server/acts/accept-link';
import { openFormAction } from '@/lib/server/http/action';
import { setSessionCookie } from '@/lib/server/identity/session-cookie';

const accept = openFormAction(AcceptLink, async (visitor, input) => {
  const { cookie } = await acceptLink(visitor, input);
  await setSessionCookie(cookie);
  redirect('/' as Route);
});

type Result = Awaited<ReturnType<typeof accept>>;

/** Sets the password by a one-time link and signs in. */
export async function acceptLinkAction(former: Result | null, form: FormData): Promise<Result> {
  return accept(former, form);
}
