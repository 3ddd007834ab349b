'use server';

import type { Route } from 'next';
import { revalidatePath } from 'next/cache';
import { redirect } from 'next/navigation';
import { OpenNight } from '@/lib/contracts/api/night';
import { openNight } from '@/lib/server/acts/open-night';
import { formAction } from '@/lib/server/http/action';

const open = formAction(OpenNight.omit({ observers: true }), async (caller, input) => {
  const { id } = await openNight(caller, input);
  revalidatePath('/', 'layout');
  redirect(`/nights/${id}` as Route);
});
/** Opens a night and goes to its log. */
export async function openNightAction(former: Awaited<ReturnType<typeof open>> | null, form: FormData) {
  return open(former, form);
}
