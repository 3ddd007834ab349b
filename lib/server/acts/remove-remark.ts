import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import { deleteRemark, findRemark, toRemark } from '@/lib/server/data/remarks';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Withdraws a remark; the audit trail keeps all of it. */
export async function removeRemark(
  caller: PersonCaller,
  ids: { readonly night: string; readonly remark: string },
  reason: string,
): Promise<void> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  await inTransaction(async (tx) => {
    await lockNight(tx, night);
    const row = await findRemark(tx, night.id, ids.remark);
    if (!row) throw new Fault('not-found', 'There is no such remark in this night.');
    await recordAudit(tx, caller, {
      act: 'remark.remove',
      subjectKind: 'remark',
      subjectId: row.publicId,
      nightId: night.id,
      reason,
      before: toRemark(row),
    });
    await deleteRemark(tx, row.id);
  });
}
