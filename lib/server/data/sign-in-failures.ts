import 'server-only';
import { execute, inTransaction, select, type Tx } from './database';

/** How tries for one subject (an account's address, a network address) slow down. */
export interface SlowDown {
  /** SHA-256 of the subject. */
  readonly subject: string;
  /** Failures that cost nothing: everybody mistypes. */
  readonly free: number;
}

/** Wait after the first failure that costs; it doubles with each further one. */
const firstWait_s = 4;
const longestWait_s = 900;
/** Failures are forgotten after a day without another. */
const memory_hours = 24;

export interface Reserved {
  /** More than zero: the try may not be made yet. */
  readonly wait_s: number;
  /** What has to be waited if the try fails. */
  readonly waitAfter_s: number;
}

/**
 * Counts a try as failed before it is made, unless one of its subjects has to wait. Counting first leaves no gap in
 * which many tries at once all find the counter low; `forgiveTry` takes it back.
 */
export async function reserveTry(subjects: readonly SlowDown[]): Promise<Reserved> {
  // One order for all, so that two tries that share subjects cannot wait for each other.
  const ordered = [...subjects].sort((a, b) => (a.subject < b.subject ? -1 : 1));
  return inTransaction(async (tx) => {
    for (const { subject } of ordered) {
      await execute(
        `INSERT IGNORE INTO sign_in_failures (subject, failures, last_failed_at, next_try_at)
         VALUES (:subject, 0, NOW(3), NOW(3))`,
        { subject },
        tx,
      );
    }
    const wait_s = await longestWaitOf(ordered, tx);
    if (wait_s > 0) return { wait_s, waitAfter_s: wait_s };
    for (const { subject, free } of ordered) {
      // Assignments run from left to right: the wait is reckoned from the new number of failures.
      await execute(
        `UPDATE sign_in_failures
            SET failures = IF(last_failed_at < NOW(3) - INTERVAL :memory HOUR, 1, failures + 1),
                last_failed_at = NOW(3),
                next_try_at = IF(failures <= :free, NOW(3),
                  NOW(3) + INTERVAL LEAST(:longest, :first * POW(2, LEAST(failures - :free - 1, 30))) SECOND)
          WHERE subject = :subject`,
        { subject, free, first: firstWait_s, longest: longestWait_s, memory: memory_hours },
        tx,
      );
    }
    return { wait_s: 0, waitAfter_s: await longestWaitOf(ordered, tx) };
  });
}

async function longestWaitOf(subjects: readonly SlowDown[], tx: Tx): Promise<number> {
  const waits = await select<{ wait_s: number }>(
    `SELECT TIMESTAMPDIFF(MICROSECOND, NOW(3), next_try_at) / 1e6 AS wait_s
       FROM sign_in_failures WHERE subject IN (:subjects) ORDER BY subject FOR UPDATE`,
    { subjects: subjects.map(({ subject }) => subject) },
    tx,
  );
  return Math.max(0, ...waits.map((row) => Number(row.wait_s)));
}

/** After a success: forgets the account's failures, and takes back the one try that was counted for its address. */
export async function forgiveTry(account: string, address: string): Promise<void> {
  await execute('DELETE FROM sign_in_failures WHERE subject = :account', { account }, null);
  await execute(
    `UPDATE sign_in_failures SET failures = failures - 1, next_try_at = NOW(3) WHERE subject = :address AND failures > 0`,
    { address },
    null,
  );
}
