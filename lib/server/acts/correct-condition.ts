import 'server-only';
import { ConditionInput, type Condition, type ConditionCorrection } from '@/lib/contracts/api/condition';
import { outsideNight } from '@/lib/contracts/api/night';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { findCondition, toCondition, updateCondition } from '@/lib/server/data/conditions';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { boundsOf, requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Corrects a conditions entry of an open night; the earlier values stay in the audit trail. */
export async function correctCondition(
  caller: PersonCaller,
  ids: { readonly night: string; readonly condition: string },
  patch: ConditionCorrection,
): Promise<Condition> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  return inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    const row = await findCondition(tx, night.id, ids.condition);
    if (!row) throw new Fault('not-found', 'There is no such conditions entry in this night.');
    const before = toCondition(row);
    const { id: _id, recorded_by: _by, ...told } = { ...before, ...patch };
    const merged = ConditionInput.safeParse(told);
    if (!merged.success)
      throw new Fault('invalid-input', 'An entry needs at least one reading or a comment.');
    const outside = outsideNight(merged.data.utc, boundsOf(night));
    if (outside !== null) {
      throw new Fault('invalid-input', 'The entry does not belong to this night.', {
        issues: [{ path: 'utc', value: merged.data.utc, message: outside }],
      });
    }
    await updateCondition(tx, row.id, merged.data);
    const changed = await findCondition(tx, night.id, ids.condition);
    if (!changed) throw new Error('A corrected entry is gone within its transaction.');
    const after = toCondition(changed);
    await recordAudit(tx, caller, {
      act: 'condition.correct',
      subjectKind: 'condition',
      subjectId: row.publicId,
      nightId: night.id,
      ...differences(before, after),
    });
    return after;
  });
}
