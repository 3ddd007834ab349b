import 'server-only';
import {
  removeExpiredKeys,
  removeExpiredSessions,
  removeOldFailures,
  removeOldJobs,
} from '@/lib/server/data/expired';
import type { JobCaller } from '@/lib/server/policy/caller';

export interface Removed {
  readonly sessions: number;
  readonly idempotencyKeys: number;
  readonly signInFailures: number;
  readonly jobs: number;
}

/** Removes what has expired and serves nobody. Each part stands for itself: it may be run again at any time. */
export async function removeExpired(_caller: JobCaller): Promise<Removed> {
  return {
    sessions: await removeExpiredSessions(),
    idempotencyKeys: await removeExpiredKeys(),
    signInFailures: await removeOldFailures(),
    jobs: await removeOldJobs(),
  };
}
