import 'server-only';
import type { Condition, ConditionInput } from '@/lib/contracts/api/condition';
import { outsideNight } from '@/lib/contracts/api/night';
import { Fault, type Issue } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { insertConditions, toCondition } from '@/lib/server/data/conditions';
import { inTransaction } from '@/lib/server/data/database';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { boundsOf, requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Adds conditions entries to an open night: all of them, or none and every fault. */
export async function addConditions(
  caller: PersonCaller,
  id: string,
  inputs: readonly ConditionInput[],
  isList: boolean,
): Promise<readonly Condition[]> {
  const night = await requireNight(nightScope(caller), id);
  demand(caller, 'night.log', subjectOf(night));
  const bounds = boundsOf(night);
  const issues = inputs.flatMap(({ utc }, index): readonly Issue[] => {
    const message = outsideNight(utc, bounds);
    return message === null ? [] : [{ path: isList ? `${index}.utc` : 'utc', value: utc, message }];
  });
  if (issues.length > 0) {
    throw new Fault('invalid-input', 'The conditions do not belong to this night; none was added.', {
      issues: issues.slice(0, 1000),
    });
  }
  return inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    const rows = await insertConditions(tx, { nightId: night.id, recordedById: caller.personId }, inputs);
    const conditions = rows.map(toCondition);
    const [first] = conditions;
    await recordAudit(tx, caller, {
      act: 'condition.add',
      nightId: night.id,
      ...(conditions.length === 1 && first
        ? { subjectKind: 'condition', subjectId: first.id, after: first }
        : { subjectKind: 'night', subjectId: night.publicId, after: { conditions: conditions.length } }),
    });
    return conditions;
  });
}
