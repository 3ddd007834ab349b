import 'server-only';
import { hasEnded, type Job } from '@/lib/contracts/api/job';
import type { JobRow } from '@/lib/server/data/jobs';
import { visibleJob } from '@/lib/server/data/visible-job';
import type { Caller } from '@/lib/server/policy/caller';
import { shownJob } from './job-shown';
import { watchJob } from './job-watcher';

export interface JobEvent {
  /** `progress`, or the state in which it ended. */
  readonly event: string;
  readonly data: Job;
}

/**
 * The job as it is now and after every change, until it has ended or the signal fires. Refuses at once what the caller
 * may not see.
 */
export async function followJob(
  caller: Caller,
  id: string,
  signal: AbortSignal,
): Promise<AsyncGenerator<JobEvent, void, void>> {
  const first = await visibleJob(caller, id);
  return states(caller, first, signal);
}

async function* states(
  caller: Caller,
  first: JobRow,
  signal: AbortSignal,
): AsyncGenerator<JobEvent, void, void> {
  let newest: JobRow | null = null;
  let wake: (() => void) | null = null;
  const nudge = (): void => {
    wake?.();
    wake = null;
  };
  const stop = watchJob(first.publicId, (row) => {
    newest = row;
    nudge();
  });
  signal.addEventListener('abort', nudge, { once: true });
  try {
    let row: JobRow | null = first;
    let told = '';
    while (!signal.aborted) {
      if (row) {
        const job = shownJob(caller, row);
        const text = JSON.stringify(job);
        if (text !== told) yield { event: hasEnded(job.state) ? job.state : 'progress', data: job };
        told = text;
        if (hasEnded(job.state)) return;
      }
      if (!newest && !signal.aborted) await new Promise<void>((resolve) => (wake = resolve));
      row = newest;
      newest = null;
    }
  } finally {
    stop();
    signal.removeEventListener('abort', nudge);
  }
}
