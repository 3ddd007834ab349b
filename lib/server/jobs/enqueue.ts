import 'server-only';
import type { JobKind } from '@/lib/contracts/job-kinds';
import { insertJob } from '@/lib/server/data/jobs';
import type { Tx } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import { actorOf, type Caller } from '@/lib/server/policy/caller';
import { jobKinds, type JobPayload } from './kinds';
import { wakeRunner } from './wake';

export interface NewJob<K extends JobKind> {
  readonly kind: K;
  readonly payload: JobPayload<K>;
  /**
   * While a job with this key is queued or running, a second one is not made. A job that has ended frees its key, so the
   * same work can be asked for again. At most 100 characters.
   */
  readonly dedupeKey?: string;
  /** The night and programme it is about (internal ids): they decide who besides its owner may see it. */
  readonly nightId?: number | null;
  readonly programmeId?: number | null;
  /** Not before this instant; at once when left out. */
  readonly runAfter?: Date;
  /** Greater is sooner. */
  readonly priority?: number;
}

/**
 * Writes a job in the transaction of the change that causes it: both happen or neither. Returns its public id, or that
 * of the job that does this already. A runner in this process begins right after the commit, others within seconds.
 */
export async function enqueue<K extends JobKind>(
  tx: Tx,
  caller: Caller,
  job: NewJob<K>,
): Promise<{ id: string }> {
  const contract = jobKinds[job.kind];
  const id = await insertJob(tx, {
    publicId: newPublicId(),
    kind: job.kind,
    payload: JSON.stringify(contract.payload.parse(job.payload)),
    dedupeKey: job.dedupeKey ?? null,
    priority: job.priority ?? 0,
    runAfter: job.runAfter ?? null,
    maxTries: contract.maxTries,
    createdById: actorOf(caller),
    nightId: job.nightId ?? null,
    programmeId: job.programmeId ?? null,
  });
  tx.afterCommit(() => {
    wakeRunner();
  });
  return { id };
}
