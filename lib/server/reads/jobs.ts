import 'server-only';
import type { Job, JobQuery, JobState } from '@/lib/contracts/api/job';
import { Fault } from '@/lib/faults/fault';
import { countJobs, findJob, listJobs } from '@/lib/server/data/jobs';
import type { Caller } from '@/lib/server/policy/caller';
import { jobScope } from '@/lib/server/policy/scope';
import { shownJob } from './job-shown';

/** A page of the jobs that the caller may see, the newest first. The cursor is the id of the last one. */
export async function readJobs(
  caller: Caller,
  query: JobQuery,
): Promise<{ items: Job[]; next: string | null }> {
  const last = query.after === undefined ? null : await findJob(query.after);
  if (query.after !== undefined && !last)
    throw new Fault('invalid-input', 'The cursor `after` is not one of ours.');
  const rows = await listJobs(jobScope(caller), {
    state: query.state,
    kind: query.kind,
    before: last && last.id,
    limit: query.limit + 1,
  });
  const items = rows.slice(0, query.limit).map((row) => shownJob(caller, row));
  return { items, next: rows.length > query.limit ? (items.at(-1)?.id ?? null) : null };
}

/** How many jobs that the caller may see are in each state. */
export async function readJobCounts(caller: Caller): Promise<Readonly<Record<JobState, number>>> {
  const counts = { queued: 0, running: 0, done: 0, failed: 0, cancelled: 0 };
  for (const { state, n } of await countJobs(jobScope(caller))) counts[state] = Number(n);
  return counts;
}
