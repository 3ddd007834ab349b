import type { JobKind } from '@/lib/contracts/job-kinds';
import type { JobPayload, JobResult } from '@/lib/server/jobs/kinds';
import type { JobCaller } from '@/lib/server/policy/caller';

export interface JobRun<K extends JobKind> {
  /** Public id. */
  readonly id: string;
  readonly payload: JobPayload<K>;
  /** As whom the job's acts run. */
  readonly caller: JobCaller;
  /** Number of this try, from 1, and how many there may be. */
  readonly attempt: number;
  readonly maxTries: number;
  /** Fires when the job is cancelled, was lost to another runner, or has to make way for a shutdown. Stop and throw. */
  readonly signal: AbortSignal;
  /** How far it is, 0 to 1, and what is being done. Call it as often as you like. */
  readonly progress: (fraction: number, message: string) => void;
}

/**
 * Does a job of one kind. It may be run again after it has begun or even finished, so what it changes must come out the
 * same. A fault ends the job for good, anything else is tried again.
 */
export type Handler<K extends JobKind> = (run: JobRun<K>) => Promise<JobResult<K>>;
export type Handlers = { readonly [K in JobKind]?: () => Promise<Handler<K>> };
