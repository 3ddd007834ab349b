import 'server-only';
import { outsideNight } from '@/lib/contracts/api/night';
import type { Remark, RemarkCorrection } from '@/lib/contracts/api/remark';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { lockNight } from '@/lib/server/data/night-state';
import { boundsOf, requireNight, subjectOf } from '@/lib/server/data/nights';
import { findRemark, toRemark, updateRemark } from '@/lib/server/data/remarks';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Corrects a remark; the earlier text stays in the audit trail. */
export async function correctRemark(
  caller: PersonCaller,
  ids: { readonly night: string; readonly remark: string },
  patch: RemarkCorrection,
): Promise<Remark> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  const outside = patch.utc === undefined ? null : outsideNight(patch.utc, boundsOf(night));
  if (outside !== null) {
    throw new Fault('invalid-input', 'The remark does not belong to this night.', {
      issues: [{ path: 'utc', value: patch.utc ?? '', message: outside }],
    });
  }
  return inTransaction(async (tx) => {
    await lockNight(tx, night);
    const row = await findRemark(tx, night.id, ids.remark);
    if (!row) throw new Fault('not-found', 'There is no such remark in this night.');
    await updateRemark(tx, row.id, {
      utc: patch.utc === undefined ? row.utc : new Date(patch.utc),
      text: patch.text ?? row.text,
    });
    const changed = await findRemark(tx, night.id, ids.remark);
    if (!changed) throw new Error('A corrected remark is gone within its transaction.');
    const after = toRemark(changed);
    await recordAudit(tx, caller, {
      act: 'remark.correct',
      subjectKind: 'remark',
      subjectId: row.publicId,
      nightId: night.id,
      ...differences(toRemark(row), after),
    });
    return after;
  });
}
