import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { deleteFrame, setThatUses } from '@/lib/server/data/frame-writes';
import { findFrame, toFrame } from '@/lib/server/data/frames';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Withdraws a frame that was logged by mistake, while nothing was measured on it. The audit trail keeps all of it. */
export async function removeFrame(
  caller: PersonCaller,
  ids: { readonly night: string; readonly frame: string },
  reason: string,
): Promise<void> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, ids.night);
  demand(caller, 'night.log', subjectOf(night));
  await inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    const row = await findFrame(scope, night.id, ids.frame, tx);
    if (!row) throw new Fault('not-found', 'There is no such frame in this night.');
    const set = await setThatUses(tx, row.id);
    if (set !== null) {
      throw new Fault(
        'conflict',
        `Frame ${row.number} has measurements, in the set “${set}”, so it cannot be withdrawn. Correct it instead.`,
      );
    }
    await recordAudit(tx, caller, {
      act: 'frame.remove',
      subjectKind: 'frame',
      subjectId: row.publicId,
      nightId: night.id,
      programmeId: row.programmeId,
      reason,
      before: toFrame(row),
    });
    await deleteFrame(tx, row.id);
  });
}
