import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { hasLivingJob } from '@/lib/server/data/jobs';
import { requireSolution, solutionSubject } from '@/lib/server/data/solutions';
import { lockSolutionState, transformationsOf } from '@/lib/server/data/transformation-runs';
import { enqueue } from '@/lib/server/jobs/enqueue';
import { transformJob } from '@/lib/server/jobs/transform-job';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Queues the transformation of a night's targets anew, after its job was cancelled or has failed for good. */
export async function transformAgain(caller: PersonCaller, id: string): Promise<{ readonly job: string }> {
  const solution = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.transform', await solutionSubject(solution.nightId));
  return inTransaction(async (tx) => {
    // Held, so that of two people who ask at once the second finds the job of the first.
    if ((await lockSolutionState(tx, solution.id)) !== 'approved')
      throw new Fault('conflict', 'Only an approved solution brings targets to the standard system.');
    const waiting = (await transformationsOf(solution.id, solution.nightId, tx)).filter(
      ({ state }) => state === 'queued',
    );
    if (waiting.length === 0)
      throw new Fault('conflict', 'Nothing of this solution waits to be transformed.');
    const job = transformJob(solution);
    if (await hasLivingJob(tx, job.dedupeKey))
      throw new Fault('conflict', 'A job is at work on this already.');
    const queued = await enqueue(tx, caller, job);
    await recordAudit(tx, caller, {
      act: 'solution.transform-again',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      after: { job: queued.id, transformations: waiting.length },
    });
    return { job: queued.id };
  });
}
