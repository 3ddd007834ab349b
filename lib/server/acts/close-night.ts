import 'server-only';
import type { CloseNight, Night } from '@/lib/contracts/api/night';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { moveNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf, toNight } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Closes an open night: from then on its log stands. */
export async function closeNight(caller: PersonCaller, id: string, input: CloseNight): Promise<Night> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, id);
  demand(caller, 'night.close', subjectOf(night));
  return inTransaction(async (tx) => {
    const before = await moveNight(tx, night, {
      from: ['open'],
      to: 'closed',
      version: input.version,
      set: {
        closed_by_id: caller.personId,
        closed_at: new Date(),
        ...(input.summary === undefined ? {} : { summary: input.summary }),
      },
    });
    await recordAudit(tx, caller, {
      act: 'night.close',
      subjectKind: 'night',
      subjectId: night.publicId,
      nightId: night.id,
      before: { state: before, ...(input.summary === undefined ? {} : { summary: night.summary }) },
      after: { state: 'closed', ...(input.summary === undefined ? {} : { summary: input.summary }) },
    });
    return toNight(await requireNight(scope, id, tx));
  });
}
