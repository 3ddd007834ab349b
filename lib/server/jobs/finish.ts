import 'server-only';
import { isFault } from '@/lib/faults/fault';
import { inTransaction } from '@/lib/server/data/database';
import { noteChange } from '@/lib/server/data/job-changes';
import { endJob } from '@/lib/server/data/job-ends';
import { requeue } from '@/lib/server/data/job-leases';
import { isOutage } from '@/lib/server/data/outage';
import { backOff_s } from './back-off';
import { sufferFailure } from './consequences';
import { jobKinds } from './kinds';
import type { Lease } from './lease';

/** What people are told of a job's error. Never a bug's own text, which may hold what is none of their business. */
export interface JobError {
  readonly code: string;
  readonly message: string;
  /** Finds the whole error in the server's log. */
  readonly reference?: string;
}

/** How a run ended: its job is done, failed, cancelled, queued again, or was somebody else's by then. */
export type Outcome = 'done' | 'failed' | 'cancelled' | 'requeued' | 'lost';

/** Records the result. */
export async function finishDone(lease: Lease, result: unknown): Promise<Outcome> {
  const checked: unknown = jobKinds[lease.kind].result.parse(result);
  const ended = await inTransaction((tx) =>
    endJob(tx, lease.id, { state: 'done', result: JSON.stringify(checked), error: null, hold: lease }),
  );
  noteChange(lease.publicId);
  return ended ? 'done' : 'lost';
}

/** Records that it stopped because somebody asked for it. */
export async function finishCancelled(lease: Lease): Promise<Outcome> {
  return end(lease, 'cancelled', null, 'Cancelled.');
}

/** Records an error: another try later while there are any and a try can help, otherwise the end. */
export async function finishFailed(lease: Lease, error: unknown, reference: string): Promise<Outcome> {
  const told = tell(error, reference);
  if (!canHelp(error) || lease.attempt >= lease.maxTries) return end(lease, 'failed', told, told.message);
  const wait_s = backOff_s(lease.attempt, jobKinds[lease.kind].longestWait_s);
  const isQueued = await requeue(lease, { wait_s, isCounted: true, error: JSON.stringify(told) });
  noteChange(lease.publicId);
  return isQueued ? 'requeued' : 'lost';
}

/** Gives the job back unfinished, for whoever is next; the try does not count. */
export async function giveBack(lease: Lease): Promise<Outcome> {
  const isQueued = await requeue(lease, { wait_s: 0, isCounted: false, error: null });
  noteChange(lease.publicId);
  return isQueued ? 'requeued' : 'lost';
}

async function end(
  lease: Lease,
  state: 'failed' | 'cancelled',
  error: JobError | null,
  reason: string,
): Promise<Outcome> {
  const ended = await inTransaction(async (tx) => {
    const json = error && JSON.stringify(error);
    if (!(await endJob(tx, lease.id, { state, result: null, error: json, hold: lease }))) return false;
    await sufferFailure(tx, lease, reason);
    return true;
  });
  noteChange(lease.publicId);
  return ended ? state : 'lost';
}

/** A rule that said no says it again; an outage or a bug's circumstances may pass. */
function canHelp(error: unknown): boolean {
  return !isFault(error) || error.code === 'unavailable' || error.code === 'too-many';
}

function tell(error: unknown, reference: string): JobError {
  if (isFault(error)) return { code: error.code, message: error.message.slice(0, 1000) };
  if (isOutage(error)) return { code: 'unavailable', message: 'The database could not be reached.' };
  return { code: 'bug', message: 'Something went wrong on our side.', reference };
}
