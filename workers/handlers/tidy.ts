import { removeExpired } from '@/lib/server/acts/remove-expired';
import { removeStaleFiles } from '@/lib/server/acts/remove-stale-files';
import type { Handler } from '../handler';

/** Removes expired sessions, idempotency keys, sign-in failures, the housekeeping's own old jobs, and files of nobody's. */
export const tidy: Handler<'tidy'> = async ({ caller }) => ({
  ...(await removeExpired(caller)),
  files: await removeStaleFiles(caller, Date.now()),
});
