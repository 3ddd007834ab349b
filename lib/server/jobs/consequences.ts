import 'server-only';
import type { JobKind } from '@/lib/contracts/job-kinds';
import type { Tx } from '@/lib/server/data/database';
import { failMail, requeueMail } from '@/lib/server/data/mails';
import { jobKinds, type JobPayload } from './kinds';

interface Consequence<K extends JobKind> {
  /** In the transaction that ends a job without its result: what waited for it must not wait for ever. */
  readonly onFailure?: (tx: Tx, payload: JobPayload<K>, reason: string) => Promise<void>;
  /** In the transaction that queues a failed job again: undoes the above. */
  readonly onRetry?: (tx: Tx, payload: JobPayload<K>) => Promise<void>;
}

const consequences: { readonly [K in JobKind]: Consequence<K> } = {
  'check-measurements': {},
  'send-mail': {
    onFailure: (tx, { mail }, reason) => failMail(tx, mail, reason),
    onRetry: (tx, { mail }) => requeueMail(tx, mail),
  },
  // The draft stays unsolved and its page says why; a new solve is a new draft.
  'solve-night': {},
  'transform-targets': {},
  tidy: {},
};

const consequenceOf = <K extends JobKind>(kind: K): Consequence<K> => consequences[kind];

/** A job has failed for good, or was cancelled. */
export async function sufferFailure<K extends JobKind>(
  tx: Tx,
  job: { readonly kind: K; readonly payload: unknown },
  reason: string,
): Promise<void> {
  const payload = jobKinds[job.kind].payload.parse(job.payload) as JobPayload<K>;
  await consequenceOf(job.kind).onFailure?.(tx, payload, reason);
}

/** A failed job is queued again. */
export async function undoFailure<K extends JobKind>(
  tx: Tx,
  job: { readonly kind: K; readonly payload: unknown },
): Promise<void> {
  const payload = jobKinds[job.kind].payload.parse(job.payload) as JobPayload<K>;
  await consequenceOf(job.kind).onRetry?.(tx, payload);
}
