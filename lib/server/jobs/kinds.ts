import 'server-only';
import { z } from 'zod';
import { PublicId } from '@/lib/contracts/common';
import type { JobKind } from '@/lib/contracts/job-kinds';

/** Long jobs share WORKER_CONCURRENCY places; short ones have places of their own, so that mail never waits behind a table. */
export type Lane = 'long' | 'short';

interface Kind<Payload extends z.ZodType = z.ZodType, Result extends z.ZodType = z.ZodType> {
  readonly payload: Payload;
  readonly result: Result;
  readonly lane: Lane;
  /** How often the work may begin before it counts as failed; a process that died counts as one. */
  readonly maxTries: number;
  /** Time after the last heartbeat at which another runner takes the job. */
  readonly lease_s: number;
  /** Longest wait between two tries. */
  readonly longestWait_s: number;
}
const kind = <P extends z.ZodType, R extends z.ZodType>(definition: Kind<P, R>): Kind<P, R> => definition;

/** The contract of every kind of job: what goes in, what comes out, how long and how often. */
export const jobKinds = {
  'check-measurements': kind({
    payload: z.object({ set: PublicId }),
    result: z.object({
      set: PublicId,
      state: z.enum(['matched', 'refused']),
      rows: z.number().int(),
      matched: z.number().int(),
      faults: z.number().int(),
    }),
    lane: 'long',
    maxTries: 3,
    lease_s: 30,
    longestWait_s: 300,
  }),
  'send-mail': kind({
    payload: z.object({ mail: PublicId }),
    result: z.object({ messageId: z.string() }),
    lane: 'short',
    // With the longest wait this is a little more than two days of a mail server being away.
    maxTries: 108,
    lease_s: 120,
    longestWait_s: 1800,
  }),
  'solve-night': kind({
    payload: z.object({ solution: PublicId }),
    result: z.object({
      solution: PublicId,
      /** Withdrawn: somebody withdrew the draft before it was solved, and nothing is stored. */
      outcome: z.enum(['determined', 'undetermined', 'withdrawn']),
      observations: z.number().int(),
      used: z.number().int(),
    }),
    lane: 'long',
    maxTries: 3,
    lease_s: 30,
    longestWait_s: 300,
  }),
  'transform-targets': kind({
    payload: z.object({ solution: PublicId, night: PublicId }),
    result: z.object({
      /** Nothing is stored when the solution was withdrawn or replaced meanwhile. */
      outcome: z.enum(['stored', 'not-approved']),
      programmes: z.number().int(),
      measurements: z.number().int(),
      stars: z.number().int(),
    }),
    lane: 'long',
    maxTries: 3,
    lease_s: 30,
    longestWait_s: 300,
  }),
  tidy: kind({
    payload: z.object({}),
    result: z.object({
      sessions: z.number().int(),
      idempotencyKeys: z.number().int(),
      jobs: z.number().int(),
      signInFailures: z.number().int(),
      files: z.number().int(),
    }),
    lane: 'short',
    maxTries: 3,
    lease_s: 60,
    longestWait_s: 600,
  }),
} as const satisfies Record<JobKind, Kind>;

export type JobPayload<K extends JobKind> = z.output<(typeof jobKinds)[K]['payload']>;
export type JobResult<K extends JobKind> = z.output<(typeof jobKinds)[K]['result']>;
