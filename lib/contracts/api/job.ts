import { z } from 'zod';
import { CalendarDate, listOf, Page, PathId, PublicId, Utc } from '@/lib/contracts/common';
import { operation } from './operation';

export const jobStates = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export const JobState = z.enum(jobStates);
export type JobState = z.infer<typeof JobState>;
export const hasEnded = (state: JobState): boolean => state !== 'queued' && state !== 'running';

export const JobError = z
  .object({
    code: z.string().meta({ description: 'Stable name of what went wrong' }),
    message: z.string(),
    reference: z.string().optional().meta({ description: 'Finds the whole error in the server’s log' }),
  })
  .meta({ id: 'JobError' });

export const Job = z
  .object({
    id: PublicId,
    kind: z.string().meta({ example: 'check-measurements' }),
    title: z.string().meta({ description: 'The kind in words' }),
    about: z
      .string()
      .meta({ description: 'What it works on, in words', example: 'standards before midnight' }),
    set: PublicId.nullable().meta({ description: 'The measurement set it works on' }),
    solution: PublicId.nullable().meta({ description: 'The solution it works on' }),
    state: JobState,
    progress: z.number().min(0).max(1),
    message: z.string().meta({ description: 'What is being done' }),
    result: z
      .unknown()
      .optional()
      .meta({ description: 'Once it is done, where you may know all of it; its form depends on the kind' }),
    error: JobError.optional().meta({ description: 'Of the last try that failed' }),
    tries: z.number().int().meta({ description: 'Tries begun so far' }),
    max_tries: z.number().int(),
    next_try_at: Utc.nullable().meta({ description: 'While it is queued: not before this' }),
    cancel_requested: z.boolean(),
    may_cancel: z.boolean().meta({ description: 'Whether you may cancel it, and it has not ended' }),
    may_retry: z.boolean().meta({ description: 'Whether you may queue it again, and it has failed' }),
    created_by: z.string().nullable().meta({ description: 'Name of the person; null for the service' }),
    night: PublicId.nullable(),
    night_date: CalendarDate.nullable(),
    telescope: z.string().nullable(),
    created_at: Utc,
    started_at: Utc.nullable(),
    finished_at: Utc.nullable(),
  })
  .meta({ id: 'Job', description: 'A piece of work that the service does in its own time' });
export type Job = z.infer<typeof Job>;

export const JobQuery = Page.extend({
  state: JobState.optional(),
  kind: z.string().max(32).optional(),
});
export type JobQuery = z.infer<typeof JobQuery>;

const params = z.object({ id: PathId.meta({ description: 'Id of the job' }) });
const tag = 'jobs';

export const listJobs = operation({
  id: 'listJobs',
  method: 'get',
  path: '/jobs',
  tag,
  summary: 'Jobs that you may see, the newest first',
  description:
    'Managers see all; others their own, those of their programmes, and those that work on the solutions of nights whose solutions they may see.',
  query: JobQuery,
  answer: listOf(Job),
});
export const getJob = operation({
  id: 'getJob',
  method: 'get',
  path: '/jobs/{id}',
  tag,
  summary: 'One job',
  params,
  answer: Job,
});
export const getJobEvents = operation({
  id: 'getJobEvents',
  method: 'get',
  path: '/jobs/{id}/events',
  tag,
  summary: 'What happens to a job, as it happens',
  description:
    'Server-sent events. The first tells the present state; `progress` follows whenever it changes; `done`, `failed` or `cancelled` is the last, and the stream ends. The data of each is the job.',
  params,
  stream: ['text/event-stream'],
});
export const cancelJob = operation({
  id: 'cancelJob',
  method: 'post',
  path: '/jobs/{id}/cancel',
  tag,
  summary: 'Cancel a job',
  description:
    'A queued job ends at once. A running one is asked to stop and ends shortly after; it may still come to be done.',
  params,
  answer: Job,
  faults: ['conflict'],
});
export const retryJob = operation({
  id: 'retryJob',
  method: 'post',
  path: '/jobs/{id}/retry',
  tag,
  summary: 'Queue a failed job again',
  params,
  answer: Job,
  faults: ['conflict'],
});
