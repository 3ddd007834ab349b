import 'server-only';
import { hasEnded } from '@/lib/contracts/api/job';
import type { Queued } from '@/lib/contracts/api/measurement-set';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { checkJobs } from '@/lib/server/data/measurement-jobs';
import { lockSet, observersOfNight, programmesInNight, requireSet } from '@/lib/server/data/measurement-sets';
import { enqueue } from '@/lib/server/jobs/enqueue';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Queues the check of a set again whose check was cancelled or failed. */
export async function checkMeasurementsAgain(caller: PersonCaller, id: string): Promise<Queued> {
  const set = await requireSet(dataScope(caller), id);
  demand(caller, 'measurements.upload', {
    observerIds: await observersOfNight(set.nightId),
    programmeIds: await programmesInNight(set.nightId),
  });
  return inTransaction(async (tx) => {
    const state = await lockSet(tx, set.id);
    if (state !== 'received' && state !== 'checked') {
      throw new Fault('conflict', `The set “${set.name}” is ${state ?? 'gone'}: its check came to an end.`);
    }
    const earlier = (await checkJobs(set.nightId, tx)).get(set.publicId);
    if (earlier && !hasEnded(earlier.state)) {
      throw new Fault('conflict', `The set “${set.name}” is being checked already.`);
    }
    const job = await enqueue(tx, caller, {
      kind: 'check-measurements',
      payload: { set: set.publicId },
      dedupeKey: `check-measurements:${set.publicId}`,
      nightId: set.nightId,
    });
    await recordAudit(tx, caller, {
      act: 'measurements.check-again',
      subjectKind: 'measurement-set',
      subjectId: set.publicId,
      nightId: set.nightId,
    });
    return { set: set.publicId, job: job.id };
  });
}
