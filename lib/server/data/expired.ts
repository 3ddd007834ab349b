import 'server-only';
import { execute } from './database';

/** At most this many rows a statement: a great backlog is removed in small bites, nobody waits for a lock. */
const bite = 5_000;

async function removeAll(sql: string): Promise<number> {
  let removed = 0;
  for (;;) {
    const rows = await execute(`${sql} LIMIT ${bite}`, {}, null);
    removed += rows;
    if (rows < bite) return removed;
  }
}

export const removeExpiredSessions = (): Promise<number> =>
  removeAll('DELETE FROM sessions WHERE expires_at < NOW(3)');

export const removeExpiredKeys = (): Promise<number> =>
  removeAll('DELETE FROM idempotency_keys WHERE expires_at < NOW(3)');

/** Failures that slow nobody down any more. */
export const removeOldFailures = (): Promise<number> =>
  removeAll(
    'DELETE FROM sign_in_failures WHERE next_try_at < NOW(3) AND last_failed_at < NOW(3) - INTERVAL 2 DAY',
  );

/** The service's own housekeeping, after a month; jobs about data stay as the record of what was done. */
export const removeOldJobs = (): Promise<number> =>
  removeAll(
    `DELETE FROM jobs
      WHERE kind IN ('tidy','send-mail') AND state IN ('done','cancelled') AND finished_at < NOW(3) - INTERVAL 30 DAY`,
  );
