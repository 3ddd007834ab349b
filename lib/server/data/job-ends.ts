import 'server-only';
import { UniqueConstraintError } from 'sequelize';
import { execute, type Tx } from './database';

export interface End {
  readonly state: 'done' | 'failed' | 'cancelled';
  /** JSON. */
  readonly result: string | null;
  /** JSON. */
  readonly error: string | null;
  /** Only while it is still held so; null for a job that the transaction has locked. */
  readonly hold: { readonly owner: string; readonly attempt: number } | null;
}

/**
 * Ends a job that is queued or running. Its key becomes free for a new job and stays readable behind it, so that a retry
 * can take it again. False when the job had ended, or is held by somebody else.
 */
export async function endJob(tx: Tx, id: number, end: End): Promise<boolean> {
  const rows = await execute(
    `UPDATE jobs
        SET state = :state, finished_at = NOW(3), lease_owner = NULL, lease_until = NULL,
            dedupe_key = CONCAT(dedupe_key, '#', public_id),
            progress = IF(:state = 'done', 1, progress), result = :result,
            error = IF(:state = 'done', NULL, COALESCE(:error, error))
      WHERE id = :id AND state IN ('queued','running')
        AND (:owner IS NULL OR (state = 'running' AND lease_owner = :owner AND tries = :attempt))`,
    {
      id,
      state: end.state,
      result: end.result,
      error: end.error,
      owner: end.hold?.owner ?? null,
      attempt: end.hold?.attempt ?? null,
    },
    tx,
  );
  return rows === 1;
}

/** Asks the runner of a running job to stop it. False when it does not run. */
export async function requestCancel(tx: Tx, id: number): Promise<boolean> {
  const rows = await execute(
    `UPDATE jobs SET cancel_requested_at = COALESCE(cancel_requested_at, NOW(3)) WHERE id = :id AND state = 'running'`,
    { id },
    tx,
  );
  return rows === 1;
}

/**
 * Queues a failed job again with all its tries. 'not-failed' when it has not failed, 'taken' when a living job does the
 * same.
 */
export async function reviveJob(tx: Tx, id: number): Promise<'revived' | 'not-failed' | 'taken'> {
  try {
    const rows = await execute(
      `UPDATE jobs
          SET state = 'queued', run_after = NOW(3), tries = 0, progress = 0, message = '', error = NULL,
              cancel_requested_at = NULL, started_at = NULL, finished_at = NULL,
              dedupe_key = LEFT(dedupe_key, CHAR_LENGTH(dedupe_key) - CHAR_LENGTH(public_id) - 1)
        WHERE id = :id AND state = 'failed'`,
      { id },
      tx,
    );
    return rows === 1 ? 'revived' : 'not-failed';
  } catch (error) {
    // The only key that this statement touches is the dedupe key.
    if (error instanceof UniqueConstraintError) return 'taken';
    throw error;
  }
}
