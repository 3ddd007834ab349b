import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { deleteCondition, findCondition, toCondition } from '@/lib/server/data/conditions';
import { inTransaction } from '@/lib/server/data/database';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Withdraws a conditions entry of an open night; the audit trail keeps all of it. */
export async function removeCondition(
  caller: PersonCaller,
  ids: { readonly night: string; readonly condition: string },
  reason: string,
): Promise<void> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  await inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    const row = await findCondition(tx, night.id, ids.condition);
    if (!row) throw new Fault('not-found', 'There is no such conditions entry in this night.');
    await recordAudit(tx, caller, {
      act: 'condition.remove',
      subjectKind: 'condition',
      subjectId: row.publicId,
      nightId: night.id,
      reason,
      before: toCondition(row),
    });
    await deleteCondition(tx, row.id);
  });
}
