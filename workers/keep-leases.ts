import { heldLeases, keepLease, type Lease } from '@/lib/server/jobs/lease';
import { stopError } from './run-job';

export interface Running {
  readonly lease: Lease;
  readonly stop: AbortController;
  /** When the lease was last known to be extended, by this process's steady clock. */
  kept_ms: number;
}

/**
 * One look at the running jobs: stops those that were cancelled or lost, and extends the leases of the others in time.
 * Throws when the database cannot be reached; then it is for `giveUpOnOverdue` to see which leases have run out.
 */
export async function keepLeases(owner: string, running: ReadonlySet<Running>): Promise<void> {
  const before_ms = performance.now();
  const held = new Map((await heldLeases(owner)).map((each) => [each.id, each]));
  for (const job of running) {
    const row = held.get(job.lease.id);
    // One that was leased after the question was put is not in the answer.
    if (job.kept_ms > before_ms) continue;
    if (row?.attempt !== job.lease.attempt) job.stop.abort(stopError('lost'));
    else if (row.isCancelRequested) job.stop.abort(stopError('cancelled'));
    if (job.kept_ms + (job.lease.lease_s * 1000) / 3 > before_ms) continue;
    const asked_ms = performance.now();
    if (await keepLease(job.lease)) job.kept_ms = asked_ms;
  }
}

/** Stops what may be somebody else's by now: its lease could not be extended for as long as it lasts. */
export function giveUpOnOverdue(running: ReadonlySet<Running>): void {
  const now_ms = performance.now();
  for (const job of running) {
    if (now_ms - job.kept_ms > job.lease.lease_s * 1000) job.stop.abort(stopError('lost'));
  }
}
