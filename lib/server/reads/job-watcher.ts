import 'server-only';
import { onChange } from '@/lib/server/data/job-changes';
import { findJobs, type JobRow } from '@/lib/server/data/jobs';
import { logger } from '@/lib/server/log/logger';

/** Jobs of other processes are seen this late at most. */
const look_ms = 700;

interface Watcher {
  readonly publicId: string;
  readonly onRow: (row: JobRow) => void;
}
interface Watch {
  readonly watchers: Set<Watcher>;
  timer: NodeJS.Timeout | null;
  looking: Promise<void> | null;
  /** Somebody asked while a look was under way. */
  isAgain: boolean;
  isOut: boolean;
  unhear: (() => void) | null;
}

/** One for the process, however many streams there are: one query looks at all watched jobs. */
const holder = globalThis as typeof globalThis & { evenfallJobWatch?: Watch };
const watch = (holder.evenfallJobWatch ??= {
  watchers: new Set(),
  timer: null,
  looking: null,
  isAgain: false,
  isOut: false,
  unhear: null,
});

/** Calls `onRow` with the job soon, and again after every look at it. Returns how to stop. */
export function watchJob(publicId: string, onRow: (row: JobRow) => void): () => void {
  const watcher = { publicId, onRow };
  watch.watchers.add(watcher);
  watch.unhear ??= onChange((changed) => {
    if ([...watch.watchers].some((each) => each.publicId === changed)) look();
  });
  look();
  return () => {
    watch.watchers.delete(watcher);
    if (watch.watchers.size > 0) return;
    if (watch.timer) clearTimeout(watch.timer);
    watch.timer = null;
    watch.unhear?.();
    watch.unhear = null;
  };
}

function look(): void {
  if (watch.looking) {
    watch.isAgain = true;
    return;
  }
  if (watch.timer) clearTimeout(watch.timer);
  watch.timer = null;
  watch.looking = lookOnce().finally(() => {
    watch.looking = null;
    if (watch.watchers.size === 0) return;
    const wait_ms = watch.isAgain ? 0 : look_ms;
    watch.isAgain = false;
    watch.timer = setTimeout(look, wait_ms);
  });
}

async function lookOnce(): Promise<void> {
  const watchers = [...watch.watchers];
  try {
    const rows = await findJobs([...new Set(watchers.map(({ publicId }) => publicId))]);
    watch.isOut = false;
    for (const row of rows) {
      for (const each of watchers)
        if (each.publicId === row.publicId && watch.watchers.has(each)) each.onRow(row);
    }
  } catch (error) {
    // The streams stay open over an outage and go on when it is over. It is said once, not at every look.
    if (!watch.isOut) logger().warn({ err: error }, 'jobs cannot be watched just now');
    watch.isOut = true;
  }
}
