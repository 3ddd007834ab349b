import 'server-only';
import { Fault } from '@/lib/faults/fault';
import type { Caller } from '@/lib/server/policy/caller';
import { may, type Subject } from '@/lib/server/policy/matrix';
import { findJob, type JobRow } from './jobs';

/** What a job's own rights depend on. */
export const jobSubject = (row: JobRow): Subject => ({
  ownerId: row.createdById,
  programmeIds: row.programmeId === null ? [] : [row.programmeId],
});

const idsIn = (list: string | null): readonly number[] => (list === null ? [] : list.split(',').map(Number));

/** What the rights on the solutions of its night depend on. */
export const jobNightSubject = (row: JobRow): Required<Pick<Subject, 'observerIds' | 'programmeIds'>> => ({
  observerIds: idsIn(row.nightObservers),
  programmeIds: idsIn(row.nightProgrammes),
});

/** Whoever may see the solutions of a night may see the jobs that work on them. `JobScope` says the same for lists. */
const maySee = (caller: Caller, row: JobRow): boolean =>
  may(caller, 'job.see', jobSubject(row)) ||
  (Number(row.isOfSolution) === 1 && may(caller, 'solution.see', jobNightSubject(row)));

/** The job; one that the caller may not see is not found. */
export async function visibleJob(caller: Caller, id: string): Promise<JobRow> {
  const row = await findJob(id);
  if (row && maySee(caller, row)) return row;
  throw new Fault('not-found', 'There is no such job, or it is not yours to see.');
}
