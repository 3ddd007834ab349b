'use server';

import { revalidatePath } from 'next/cache';
import { headers } from 'next/headers';
import { z } from 'zod';
import { ChangeName, ChangePassword, MakeToken, SessionAlone, TokenAlone } from '@/lib/contracts/account';
import { changeOwnName } from '@/lib/server/acts/change-own-name';
import { changeOwnPassword } from '@/lib/server/acts/change-own-password';
import { endOtherSessions } from '@/lib/server/acts/end-other-sessions';
import { endOwnSession } from '@/lib/server/acts/end-own-session';
import { makeToken } from '@/lib/server/acts/make-token';
import { revokeToken } from '@/lib/server/acts/revoke-token';
import { formAction } from '@/lib/server/http/action';
import { visitorFrom } from '@/lib/server/http/visitor';
import { readSessionCookie } from '@/lib/server/identity/session-cookie';

const anew = <T>(value: T): T => {
  revalidatePath('/', 'layout');
  return value;
};

const rename = formAction(ChangeName, async (caller, input) => anew(await changeOwnName(caller, input)));
export async function changeNameAction(former: Awaited<ReturnType<typeof rename>> | null, form: FormData) {
  return rename(former, form);
}

const renew = formAction(ChangePassword, async (caller, input) => {
  const visitor = visitorFrom(await headers(), caller.requestId);
  return anew(await changeOwnPassword(caller, { ...input, visitor, cookie: await readSessionCookie() }));
});
export async function changePasswordAction(former: Awaited<ReturnType<typeof renew>> | null, form: FormData) {
  return renew(former, form);
}

const make = formAction(MakeToken, async (caller, { name, access, life }) =>
  anew(
    await makeToken(caller, {
      name,
      scopes: access === 'read' ? ['read'] : ['read', 'write'],
      life_days: life,
    }),
  ),
);
export async function makeTokenAction(former: Awaited<ReturnType<typeof make>> | null, form: FormData) {
  return make(former, form);
}

const revoke = formAction(TokenAlone, async (caller, input) => anew(await revokeToken(caller, input)));
export async function revokeTokenAction(former: Awaited<ReturnType<typeof revoke>> | null, form: FormData) {
  return revoke(former, form);
}

const endOne = formAction(SessionAlone, async (caller, input) => anew(await endOwnSession(caller, input)));
export async function endSessionAction(former: Awaited<ReturnType<typeof endOne>> | null, form: FormData) {
  return endOne(former, form);
}

const endOthers = formAction(z.object({}), async (caller) =>
  anew(await endOtherSessions(caller, { cookie: await readSessionCookie() })),
);
export async function endOtherSessionsAction(
  former: Awaited<ReturnType<typeof endOthers>> | null,
  form: FormData,
) {
  return endOthers(former, form);
}
