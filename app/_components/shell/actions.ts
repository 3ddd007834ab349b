'use server';

import { cookies } from 'next/headers';
import { ChooseLight } from '@/lib/contracts/account';
import { lightCookie, lightCookieAge_s, type Light } from '@/lib/contracts/light';
import { chooseLight as keepLight } from '@/lib/server/acts/choose-light';
import { action, openFormAction } from '@/lib/server/http/action';
import { currentCaller } from '@/lib/server/identity/current-caller';

const remember = openFormAction(ChooseLight, async (_who, { light }) => {
  (await cookies()).set(lightCookie, light, { maxAge: lightCookieAge_s, sameSite: 'lax', path: '/' });
  const caller = await currentCaller();
  if (caller) await keepLight(caller, { light });
  return light;
});

/** Remembers the light that a person chose, for browsers without scripts; with them the switch does it at once. */
export async function chooseLight(former: Awaited<ReturnType<typeof remember>> | null, form: FormData) {
  return remember(former, form);
}

const keep = action(ChooseLight, keepLight);

/** Remembers the light of a signed-in person for browsers to come. Sets no cookie, so that the page is not made anew. */
export async function rememberLight(light: Light) {
  return keep({ light });
}
