import 'server-only';
import type { TimeLoss, TimeLossCorrection } from '@/lib/contracts/api/time-loss';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { lockNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import { demandRoomForLoss, findTimeLoss, toTimeLoss, updateTimeLoss } from '@/lib/server/data/time-losses';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Corrects an entry of time lost; the earlier values stay in the audit trail. */
export async function correctTimeLoss(
  caller: PersonCaller,
  ids: { readonly night: string; readonly loss: string },
  patch: TimeLossCorrection,
): Promise<TimeLoss> {
  const night = await requireNight(nightScope(caller), ids.night);
  demand(caller, 'night.log', subjectOf(night));
  return inTransaction(async (tx) => {
    await lockNight(tx, night);
    const row = await findTimeLoss(tx, night.id, ids.loss);
    if (!row) throw new Fault('not-found', 'There is no such entry of time lost in this night.');
    const values = {
      cause: patch.cause ?? row.cause,
      minutes: patch.minutes ?? row.minutes,
      comment: patch.comment ?? row.comment,
    };
    await demandRoomForLoss(tx, night.id, values.minutes, row.id);
    await updateTimeLoss(tx, row.id, values);
    const after = { ...toTimeLoss(row), ...values };
    await recordAudit(tx, caller, {
      act: 'time-loss.correct',
      subjectKind: 'time-loss',
      subjectId: row.publicId,
      nightId: night.id,
      ...differences(toTimeLoss(row), after),
    });
    return after;
  });
}
