import 'server-only';
import { Fault } from '@/lib/faults/fault';
import type { Caller } from '@/lib/server/policy/caller';
import { may, type Subject } from '@/lib/server/policy/matrix';
import { findJob, type JobRow } from './jobs';

/** What a job's rights depend on. */
export const jobSubject = (row: JobRow): Subject => ({
  ownerId: row.createdById,
  programmeIds: row.programmeId === null ? [] : [row.programmeId],
});

/** The job; one that the caller may not see is not found. */
export async function visibleJob(caller: Caller, id: string): Promise<JobRow> {
  const row = await findJob(id);
  if (row && may(caller, 'job.see', jobSubject(row))) return row;
  throw new Fault('not-found', 'There is no such job, or it is not yours to see.');
}
