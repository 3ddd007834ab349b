import 'server-only';
import { isJobKind, type JobKind } from '@/lib/contracts/job-kinds';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { endJob } from '@/lib/server/data/job-ends';
import {
  heldBy,
  extendLease,
  lockDue,
  lockExpired,
  lockHeld,
  take,
  type LeasedRow,
} from '@/lib/server/data/job-leases';
import type { Caller, JobCaller } from '@/lib/server/policy/caller';
import { sufferFailure } from './consequences';
import { jobKinds } from './kinds';

/** A job that a runner holds. The hold ends when it finishes the job, or when it does not extend the lease in time. */
export interface Lease<K extends JobKind = JobKind> {
  readonly id: number;
  readonly publicId: string;
  readonly kind: K;
  readonly payload: unknown;
  readonly owner: string;
  /** Number of this try, from 1. */
  readonly attempt: number;
  readonly maxTries: number;
  readonly createdById: number | null;
  readonly lease_s: number;
}

export interface LeaseRequest {
  readonly owner: string;
  readonly kinds: readonly JobKind[];
  readonly limit: number;
  /** Instead of what the kinds say. */
  readonly lease_s?: number | undefined;
}

/** Takes up to `limit` jobs: first those whose runner died, then those that are due. All times are the database's. */
export async function leaseJobs(request: LeaseRequest): Promise<readonly Lease[]> {
  const { kinds, limit } = request;
  if (limit < 1 || kinds.length === 0) return [];
  return inTransaction(async (tx) => {
    const left: LeasedRow[] = [];
    for (const row of await lockExpired(tx, kinds, limit)) {
      if (!(await endHopeless(tx, row))) left.push(row);
    }
    if (left.length < limit) left.push(...(await lockDue(tx, kinds, limit - left.length)));
    const leases: Lease[] = [];
    for (const row of left) {
      if (!isJobKind(row.kind)) continue;
      const lease_s = request.lease_s ?? jobKinds[row.kind].lease_s;
      await take(tx, row.id, request.owner, lease_s);
      leases.push({ ...row, kind: row.kind, owner: request.owner, attempt: row.attempt + 1, lease_s });
    }
    return leases;
  });
}

/** Ends a job whose runner died, when it was to be cancelled or has no try left. */
async function endHopeless(tx: Tx, row: LeasedRow): Promise<boolean> {
  const isCancelled = row.isCancelRequested === 1;
  if (!isCancelled && row.attempt < row.maxTries) return false;
  const message = isCancelled
    ? 'Cancelled.'
    : `The process that did this ended unexpectedly, ${row.attempt} times. The server's log says more.`;
  await endJob(tx, row.id, {
    state: isCancelled ? 'cancelled' : 'failed',
    result: null,
    error: isCancelled ? null : JSON.stringify({ code: 'died', message }),
    hold: null,
  });
  if (isJobKind(row.kind)) await sufferFailure(tx, { kind: row.kind, payload: row.payload }, message);
  return true;
}

/** Extends the lease by its full length. False when somebody else has the job, or it has ended. */
export const keepLease = (lease: Lease): Promise<boolean> => extendLease(lease, lease.lease_s);

export interface Held {
  readonly id: number;
  readonly attempt: number;
  readonly isCancelRequested: boolean;
}

/** What the owner holds by the database's account: whatever is missing has been lost. */
export async function heldLeases(owner: string): Promise<readonly Held[]> {
  const rows = await heldBy(owner);
  return rows.map(({ id, attempt, isCancelRequested }) => ({
    id,
    attempt,
    isCancelRequested: Number(isCancelRequested) === 1,
  }));
}

/**
 * Within a job's own transaction: goes on only while the job is still this runner's, so that a runner which was paused
 * and has lost its job cannot write a second result. Call it last: it holds the job's row until the commit, and the
 * heartbeat waits for that. Does nothing for a person.
 */
export async function demandLease(tx: Tx, caller: Caller): Promise<void> {
  if (caller.kind !== 'job' || !caller.lease) return;
  if (await lockHeld(tx, { publicId: caller.jobId, ...caller.lease })) return;
  throw new Error(`The job ${caller.jobId} is no longer held by ${caller.lease.owner}.`);
}

/** The caller as whom a job's acts run. */
export const callerOf = (lease: Lease): JobCaller => ({
  kind: 'job',
  jobId: lease.publicId,
  personId: lease.createdById,
  requestId: `job:${lease.publicId}`,
  lease: { owner: lease.owner, attempt: lease.attempt },
});
