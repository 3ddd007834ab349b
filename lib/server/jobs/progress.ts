import 'server-only';
import { noteChange } from '@/lib/server/data/job-changes';
import { writeProgress } from '@/lib/server/data/job-leases';
import type { Lease } from './lease';

/** Nobody reads faster than this, and each report is a write. */
const pause_ms = 400;

export interface ProgressReports {
  /** Keeps the newest report and writes it soon; never waits and never throws. */
  readonly report: (fraction: number, message: string) => void;
  /** Writes nothing more, and waits for a write under way. */
  readonly stop: () => Promise<void>;
}

/** Progress of a held job: as many reports as the work likes, a few writes a second. */
export function progressReports(lease: Lease, onError: (error: unknown) => void): ProgressReports {
  let newest: { fraction: number; message: string } | null = null;
  let timer: NodeJS.Timeout | null = null;
  let writing: Promise<void> = Promise.resolve();
  let written_ms = 0;
  let isStopped = false;

  const write = (): void => {
    timer = null;
    const report = newest;
    newest = null;
    if (!report || isStopped) return;
    written_ms = Date.now();
    writing = writing
      .then(() => writeProgress(lease, report.fraction, report.message))
      // Progress is a courtesy: without it the work goes on.
      .then(() => noteChange(lease.publicId), onError);
  };
  return {
    report: (fraction, message) => {
      newest = { fraction: Math.min(1, Math.max(0, fraction || 0)), message: message.slice(0, 300) };
      timer ??= setTimeout(write, Math.max(0, written_ms + pause_ms - Date.now()));
    },
    stop: async () => {
      isStopped = true;
      if (timer) clearTimeout(timer);
      await writing;
    },
  };
}
