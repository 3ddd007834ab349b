import 'server-only';
import { isJobKind } from '@/lib/contracts/job-kinds';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { noteChange } from '@/lib/server/data/job-changes';
import { reviveJob } from '@/lib/server/data/job-ends';
import { jobSubject, visibleJob } from '@/lib/server/data/visible-job';
import { undoFailure } from '@/lib/server/jobs/consequences';
import { wakeRunner } from '@/lib/server/jobs/wake';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Queues a failed job again, with all its tries. */
export async function retryJob(caller: PersonCaller, id: string): Promise<void> {
  const job = await visibleJob(caller, id);
  demand(caller, 'job.retry', jobSubject(job));
  await inTransaction(async (tx) => {
    const outcome = await reviveJob(tx, job.id);
    if (outcome === 'taken') throw new Fault('conflict', 'A newer job does the same work already.');
    if (outcome === 'not-failed') throw new Fault('conflict', 'Only a failed job can be tried again.');
    if (isJobKind(job.kind)) await undoFailure(tx, { kind: job.kind, payload: job.payload });
    await recordAudit(tx, caller, {
      act: 'job.retry',
      subjectKind: 'job',
      subjectId: job.publicId,
      programmeId: job.programmeId,
      before: { state: 'failed' },
      after: { state: 'queued' },
    });
  });
  noteChange(job.publicId);
  wakeRunner();
}
