import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import { deleteTimeLoss, findTimeLoss, toTimeLoss } from '@/lib/server/data/time-losses';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Withdraws an entry of time lost; the audit trail keeps all of it. */
export async function removeTimeLoss(
  caller: PersonCaller,
  ids: { readonly night: string; readonly loss: string },
  reason: string,
): Promise<void> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  await inTransaction(async (tx) => {
    await lockNight(tx, night);
    const row = await findTimeLoss(tx, night.id, ids.loss);
    if (!row) throw new Fault('not-found', 'There is no such entry of time lost in this night.');
    await recordAudit(tx, caller, {
      act: 'time-loss.remove',
      subjectKind: 'time-loss',
      subjectId: row.publicId,
      nightId: night.id,
      reason,
      before: toTimeLoss(row),
    });
    await deleteTimeLoss(tx, row.id);
  });
}
