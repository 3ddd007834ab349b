'use server';

import { revalidatePath } from 'next/cache';
import { ChangePerson, InvitePerson, PersonAlone } from '@/lib/contracts/people';
import { changePerson } from '@/lib/server/acts/change-person';
import { disablePerson } from '@/lib/server/acts/disable-person';
import { enablePerson } from '@/lib/server/acts/enable-person';
import { invitePerson } from '@/lib/server/acts/invite-person';
import { makePersonLink } from '@/lib/server/acts/make-person-link';
import { formAction } from '@/lib/server/http/action';

const anew = <T>(value: T): T => {
  revalidatePath('/people');
  return value;
};

const invite = formAction(InvitePerson, async (caller, input) => anew(await invitePerson(caller, input)));
export async function invitePersonAction(former: Awaited<ReturnType<typeof invite>> | null, form: FormData) {
  return invite(former, form);
}

const change = formAction(ChangePerson, async (caller, input) => anew(await changePerson(caller, input)));
export async function changePersonAction(former: Awaited<ReturnType<typeof change>> | null, form: FormData) {
  return change(former, form);
}

const disable = formAction(PersonAlone, async (caller, input) => anew(await disablePerson(caller, input)));
export async function disablePersonAction(
  former: Awaited<ReturnType<typeof disable>> | null,
  form: FormData,
) {
  return disable(former, form);
}

const enable = formAction(PersonAlone, async (caller, input) => anew(await enablePerson(caller, input)));
export async function enablePersonAction(former: Awaited<ReturnType<typeof enable>> | null, form: FormData) {
  return enable(former, form);
}

const link = formAction(PersonAlone, async (caller, input) => makePersonLink(caller, input));
export async function makePersonLinkAction(former: Awaited<ReturnType<typeof link>> | null, form: FormData) {
  return link(former, form);
}
