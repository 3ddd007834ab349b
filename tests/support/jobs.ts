import { expect } from 'vitest';
import { execute, inTransaction, insert, selectOne } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { JobState } from '@/lib/server/data/jobs';
import { enqueue, type NewJob } from '@/lib/server/jobs/enqueue';
import type { JobKind } from '@/lib/contracts/job-kinds';
import type { JobCaller, PersonCaller } from '@/lib/server/policy/caller';
import type { ObservatoryRole } from '@/lib/contracts/roles';

export const system: JobCaller = { kind: 'job', jobId: 'test', personId: null, requestId: 'test' };

/** A person in the database, as a caller with a session. */
export async function makePerson(name: string, ...roles: readonly ObservatoryRole[]): Promise<PersonCaller> {
  const publicId = newPublicId();
  const email = `${publicId}@evenfall.example`;
  const personId = await insert(
    'INSERT INTO people (public_id, email, name) VALUES (:publicId, :email, :name)',
    { publicId, email, name },
    null,
  );
  return {
    kind: 'person',
    personId,
    publicId,
    name,
    email,
    roles: new Set(roles),
    programmes: new Map(),
    via: 'session',
    scopes: new Set(['read', 'write']),
    requestId: 'test',
  };
}

export const queueJob = async <K extends JobKind>(
  job: NewJob<K>,
  caller: JobCaller | PersonCaller = system,
): Promise<string> => (await inTransaction((tx) => enqueue(tx, caller, job))).id;

/** A job of the long lane that a test's own handler does. */
export const queueCheck = (caller?: PersonCaller): Promise<string> =>
  queueJob({ kind: 'check-measurements', payload: { set: newPublicId() } }, caller);

export interface JobNow {
  readonly state: JobState;
  readonly tries: number;
  readonly progress: number;
  readonly message: string;
  readonly result: unknown;
  readonly error: { code: string; message: string; reference?: string } | null;
  readonly owner: string | null;
  /** Seconds from now until it may be tried. */
  readonly wait_s: number;
  readonly dedupeKey: string | null;
}

export async function jobNow(id: string): Promise<JobNow> {
  const row = await selectOne<JobNow>(
    `SELECT state, tries, progress, message, result, error, lease_owner AS owner, dedupe_key AS dedupeKey,
            TIMESTAMPDIFF(MICROSECOND, NOW(3), run_after) / 1e6 AS wait_s FROM jobs WHERE public_id = :id`,
    { id },
  );
  if (!row) throw new Error(`There is no job ${id}.`);
  return { ...row, wait_s: Number(row.wait_s) };
}

/** Waits until the job is in the state; fails with what it is instead. */
export async function untilJob(id: string, state: JobState, patience_ms = 10_000): Promise<JobNow> {
  const end = Date.now() + patience_ms;
  for (;;) {
    const job = await jobNow(id);
    if (job.state === state) return job;
    if (Date.now() > end) expect(job, `job ${id} after ${patience_ms} ms`).toMatchObject({ state });
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
}

/** Makes a job that waits for its next try due at once. */
export const makeDue = (id: string): Promise<number> =>
  execute('UPDATE jobs SET run_after = NOW(3) WHERE public_id = :id', { id }, null);

export const checkResult = (set: string) => ({
  set,
  state: 'matched' as const,
  rows: 0,
  matched: 0,
  faults: 0,
});
