import 'server-only';
import type { TimeLoss, TimeLossInput } from '@/lib/contracts/api/time-loss';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import { newPublicId } from '@/lib/server/data/public-id';
import { demandRoomForLoss, findTimeLoss, insertTimeLoss, toTimeLoss } from '@/lib/server/data/time-losses';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Records time lost in a night of any state: it is often known in the morning only. */
export async function addTimeLoss(caller: PersonCaller, id: string, input: TimeLossInput): Promise<TimeLoss> {
  const night = await requireNight(nightScope(caller), id);
  demand(caller, 'night.log', subjectOf(night));
  const publicId = newPublicId();
  return inTransaction(async (tx) => {
    await lockNight(tx, night);
    await demandRoomForLoss(tx, night.id, input.minutes, null);
    await insertTimeLoss(tx, { publicId, nightId: night.id, recordedById: caller.personId, ...input });
    const row = await findTimeLoss(tx, night.id, publicId);
    if (!row) throw new Error('An entry of time lost is gone within its transaction.');
    const loss = toTimeLoss(row);
    await recordAudit(tx, caller, {
      act: 'time-loss.add',
      subjectKind: 'time-loss',
      subjectId: publicId,
      nightId: night.id,
      after: loss,
    });
    return loss;
  });
}
