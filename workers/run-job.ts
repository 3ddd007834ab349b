import { randomUUID } from 'node:crypto';
import type { JobKind } from '@/lib/contracts/job-kinds';
import { finishCancelled, finishDone, finishFailed, giveBack, type Outcome } from '@/lib/server/jobs/finish';
import { jobKinds, type JobPayload } from '@/lib/server/jobs/kinds';
import { callerOf, type Lease } from '@/lib/server/jobs/lease';
import { patiently } from '@/lib/server/jobs/patiently';
import { progressReports } from '@/lib/server/jobs/progress';
import { logger } from '@/lib/server/log/logger';
import type { Handler, Handlers } from './handler';

/** Why a run is stopped from outside; the reason of its abort signal. */
export type StopReason = 'cancelled' | 'lost' | 'shutdown';
export const stopError = (reason: StopReason): Error =>
  Object.assign(new Error(`The job was stopped: ${reason}.`), { reason });

/**
 * Runs a leased job to its end and records it. Never throws: whatever the work throws is the job's outcome, and when
 * even that cannot be recorded the lease runs out and the job is taken up again.
 */
export async function runJob(lease: Lease, handlers: Handlers, stop: AbortSignal): Promise<Outcome> {
  const log = logger().child({ job: lease.publicId, kind: lease.kind, attempt: lease.attempt });
  const reports = progressReports(lease, (error) =>
    log.warn({ err: error }, 'progress could not be written'),
  );
  const ended = await work(lease, handlers, { stop, report: reports.report });
  await reports.stop();
  try {
    const outcome = await patiently(() => record(lease, ended, stop), lease.lease_s);
    if (ended.kind === 'threw' && (outcome === 'failed' || outcome === 'requeued') && !stop.aborted) {
      log.warn({ err: ended.error, reference: ended.reference, outcome }, 'a job failed');
    } else log.info({ outcome }, 'a job ended');
    return outcome;
  } catch (error) {
    log.warn({ err: error }, 'the end of a job could not be recorded; its lease runs out');
    return 'lost';
  }
}

type Ended =
  | { readonly kind: 'returned'; readonly result: unknown }
  | { readonly kind: 'threw'; readonly error: unknown; readonly reference: string };

async function work<K extends JobKind>(
  lease: Lease<K>,
  handlers: Handlers,
  run: { readonly stop: AbortSignal; readonly report: (fraction: number, message: string) => void },
): Promise<Ended> {
  try {
    const load = handlers[lease.kind] as (() => Promise<Handler<K>>) | undefined;
    if (!load) throw new Error(`There is no handler for jobs of the kind ${lease.kind}.`);
    const handler = await load();
    const result: unknown = await handler({
      id: lease.publicId,
      payload: jobKinds[lease.kind].payload.parse(lease.payload) as JobPayload<K>,
      caller: callerOf(lease),
      attempt: lease.attempt,
      maxTries: lease.maxTries,
      signal: run.stop,
      progress: run.report,
    });
    return { kind: 'returned', result: jobKinds[lease.kind].result.parse(result) };
  } catch (error) {
    // The runner is one of the four places that catch everything.
    return { kind: 'threw', error, reference: randomUUID() };
  }
}

async function record(lease: Lease, ended: Ended, stop: AbortSignal): Promise<Outcome> {
  // Work that came to its end before it noticed the stop is done all the same.
  if (ended.kind === 'returned') return finishDone(lease, ended.result);
  const reason = stop.aborted ? (stop.reason as { reason?: StopReason }).reason : undefined;
  switch (reason) {
    case 'cancelled':
      return finishCancelled(lease);
    case 'shutdown':
      return giveBack(lease);
    case 'lost':
      return 'lost';
    case undefined:
      return finishFailed(lease, ended.error, ended.reference);
  }
}
