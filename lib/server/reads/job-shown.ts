import 'server-only';
import { hasEnded, JobError, type Job } from '@/lib/contracts/api/job';
import { isJobKind, jobTitles } from '@/lib/contracts/job-kinds';
import type { JobRow } from '@/lib/server/data/jobs';
import { jobNightSubject, jobSubject } from '@/lib/server/data/visible-job';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

const utc = (instant: Date): string => instant.toISOString();
const utcOrNull = (instant: Date | null): string | null => instant && instant.toISOString();

/** What a job works on, in words. */
function aboutOf(row: JobRow): string {
  if (row.mailSubject !== null) return `${row.mailSubject} (to ${row.mailRecipient ?? ''})`;
  if (row.solutionNumber !== null) return `solution ${row.solutionNumber}`;
  return row.setName ?? '';
}

/**
 * Whether the caller may know all that the job tells. A transformation counts the measurements of all programmes of its
 * night; an investigator of one of them sees how far it is, and no more.
 */
function seesWhole(caller: Caller, row: JobRow): boolean {
  if (row.kind !== 'transform-targets' || row.createdById === caller.personId) return true;
  const { all, observerId } = dataScope(caller);
  return all || (observerId !== null && jobNightSubject(row).observerIds.includes(observerId));
}

/** A job as this caller sees it. */
export function shownJob(caller: Caller, row: JobRow): Job {
  const isWhole = seesWhole(caller, row);
  const partial = row.state === 'running' ? 'Transforming the night’s targets' : '';
  const error = JobError.safeParse(row.error);
  return {
    id: row.publicId,
    kind: row.kind,
    title: isJobKind(row.kind) ? jobTitles[row.kind] : row.kind,
    about: aboutOf(row),
    set: row.setPublicId,
    solution: row.solutionPublicId,
    state: row.state,
    progress: row.progress,
    message: isWhole ? row.message : partial,
    ...(row.result === null || !isWhole ? {} : { result: row.result }),
    ...(error.success ? { error: error.data } : {}),
    tries: row.tries,
    max_tries: row.maxTries,
    next_try_at: row.state === 'queued' ? utc(row.runAfter) : null,
    cancel_requested: Number(row.isCancelRequested) === 1,
    may_cancel: !hasEnded(row.state) && may(caller, 'job.cancel', jobSubject(row)),
    may_retry: row.state === 'failed' && may(caller, 'job.retry', jobSubject(row)),
    created_by: row.createdBy,
    night: row.nightPublicId,
    night_date: row.nightDate,
    telescope: row.telescope,
    created_at: utc(row.createdAt),
    started_at: utcOrNull(row.startedAt),
    finished_at: utcOrNull(row.finishedAt),
  };
}
