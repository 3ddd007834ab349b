import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { replaceFaults, unloadMeasurements } from '@/lib/server/data/measurement-loads';
import {
  lockSet,
  moveSet,
  observersOfNight,
  programmesInNight,
  requireSet,
} from '@/lib/server/data/measurement-sets';
import { inUseFault } from '@/lib/server/data/set-holders';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Takes a matched set back that nothing uses yet: a wrong file, a better reduction. The original stays. */
export async function refuseMeasurements(caller: PersonCaller, id: string, reason: string): Promise<void> {
  const set = await requireSet(dataScope(caller), id);
  demand(caller, 'measurements.refuse', {
    observerIds: await observersOfNight(set.nightId),
    programmeIds: await programmesInNight(set.nightId),
    ownerId: set.uploadedById,
  });
  await inTransaction(async (tx) => {
    if ((await lockSet(tx, set.id)) === 'in use')
      throw await inUseFault(
        tx,
        dataScope(caller),
        set,
        'the set can be taken back; a new solution can leave single standards out instead',
      );
    await moveSet(tx, set, { from: ['matched'], to: 'refused', set: { n_matched: 0 } });
    await unloadMeasurements(tx, set.id);
    // Not a fault of the table, but where whoever looks for its rows will look for the reason.
    await replaceFaults(tx, set.id, [{ path: '', message: `Taken back by ${caller.name}: ${reason}` }]);
    await recordAudit(tx, caller, {
      act: 'measurements.refuse',
      subjectKind: 'measurement-set',
      subjectId: set.publicId,
      nightId: set.nightId,
      reason,
      before: { state: 'matched', rows: set.nRows, matchedRows: set.nMatched },
      after: { state: 'refused' },
    });
  });
}
