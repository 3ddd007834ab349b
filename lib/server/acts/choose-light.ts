import 'server-only';
import type { Light } from '@/lib/contracts/light';
import { setLight } from '@/lib/server/data/people';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Remembers the caller's light for browsers that have none yet. A matter of taste: it leaves no trail. */
export async function chooseLight(
  caller: PersonCaller,
  { light }: { readonly light: Light },
): Promise<{ readonly light: Light }> {
  demand(caller, 'account.change');
  await setLight(caller.personId, light, null);
  return { light };
}
