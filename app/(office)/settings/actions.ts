'use server';

import { revalidatePath } from 'next/cache';
import { ChangeSettings } from '@/lib/contracts/settings';
import { changeSettings } from '@/lib/server/acts/change-settings';
import { formAction } from '@/lib/server/http/action';

const change = formAction(ChangeSettings, async (caller, input) => {
  const changed = await changeSettings(caller, input);
  revalidatePath('/', 'layout');
  return changed;
});
export async function changeSettingsAction(
  former: Awaited<ReturnType<typeof change>> | null,
  form: FormData,
) {
  return change(former, form);
}
