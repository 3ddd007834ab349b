import 'server-only';
import type { Job } from '@/lib/contracts/api/job';
import { visibleJob } from '@/lib/server/data/visible-job';
import type { Caller } from '@/lib/server/policy/caller';
import { shownJob } from './job-shown';

/** One job; one that the caller may not see is not found. */
export async function readJob(caller: Caller, id: string): Promise<Job> {
  return shownJob(caller, await visibleJob(caller, id));
}
