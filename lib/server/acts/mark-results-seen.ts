import 'server-only';
import type { SeenResults } from '@/lib/contracts/calibrated-page';
import { markResultsSeen as remember } from '@/lib/server/data/seen-results';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Remembers that the caller has opened a programme's results of a night. It concerns nobody else: it leaves no trail. */
export async function markResultsSeen(
  caller: PersonCaller,
  { night, programme }: SeenResults,
): Promise<void> {
  demand(caller, 'account.change');
  await remember(dataScope(caller), caller.personId, night, programme);
}
