import 'server-only';
import { inTransaction } from '@/lib/server/data/database';
import { hasRecentJob } from '@/lib/server/data/jobs';
import type { JobCaller } from '@/lib/server/policy/caller';
import { enqueue } from './enqueue';

const every_min = 60;
const system: JobCaller = { kind: 'job', jobId: 'schedule', personId: null, requestId: 'schedule' };

/** Queues the hourly tidying, unless a runner has: any of them may ask, as often as it likes. */
export async function scheduleTidy(): Promise<void> {
  await inTransaction(async (tx) => {
    if (await hasRecentJob(tx, 'tidy', every_min)) return;
    await enqueue(tx, system, { kind: 'tidy', payload: {}, dedupeKey: 'tidy', priority: -1 });
  });
}
