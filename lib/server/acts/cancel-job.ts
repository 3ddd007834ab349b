import 'server-only';
import { isJobKind } from '@/lib/contracts/job-kinds';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { noteChange } from '@/lib/server/data/job-changes';
import { endJob, requestCancel } from '@/lib/server/data/job-ends';
import { lockJob } from '@/lib/server/data/jobs';
import { jobSubject, visibleJob } from '@/lib/server/data/visible-job';
import { sufferFailure } from '@/lib/server/jobs/consequences';
import { wakeRunner } from '@/lib/server/jobs/wake';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Cancels a job: a queued one ends at once, a running one is asked to stop. */
export async function cancelJob(caller: PersonCaller, id: string): Promise<void> {
  const job = await visibleJob(caller, id);
  demand(caller, 'job.cancel', jobSubject(job));
  await inTransaction(async (tx) => {
    const state = await lockJob(tx, job.id);
    if (state === 'queued') {
      await endJob(tx, job.id, { state: 'cancelled', result: null, error: null, hold: null });
      if (isJobKind(job.kind))
        await sufferFailure(tx, { kind: job.kind, payload: job.payload }, `Cancelled by ${caller.name}.`);
    } else if (!(await requestCancel(tx, job.id))) {
      throw new Fault('conflict', `The job has ended already: it is ${state}.`);
    }
    await recordAudit(tx, caller, {
      act: 'job.cancel',
      subjectKind: 'job',
      subjectId: job.publicId,
      programmeId: job.programmeId,
      before: { state },
      after: { state: state === 'queued' ? 'cancelled' : 'asked to stop' },
    });
  });
  noteChange(job.publicId);
  wakeRunner();
}
