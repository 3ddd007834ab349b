'use server';

import { cookies } from 'next/headers';
import { z } from 'zod';
import { Light, lightCookie, lightCookieAge_s } from '@/lib/contracts/light';
import { openFormAction } from '@/lib/server/http/action';

const remember = openFormAction(z.object({ light: Light }), async (_who, { light }) => {
  (await cookies()).set(lightCookie, light, { maxAge: lightCookieAge_s, sameSite: 'lax', path: '/' });
  return light;
});

/** Remembers the light that a person chose, for browsers without scripts; with them the switch does it at once. */
export async function chooseLight(former: Awaited<ReturnType<typeof remember>> | null, form: FormData) {
  return remember(former, form);
}
