import 'server-only';
import { execute, select, type Tx } from './database';

/** A job as its runner holds it. `attempt` and `owner` together say which hold it is. */
export interface LeasedRow {
  readonly id: number;
  readonly publicId: string;
  readonly kind: string;
  readonly payload: unknown;
  readonly attempt: number;
  readonly maxTries: number;
  readonly createdById: number | null;
  readonly isCancelRequested: 0 | 1;
}
export interface Hold {
  readonly id: number;
  readonly owner: string;
  readonly attempt: number;
}

const columns = `id, public_id AS publicId, kind, payload, tries AS attempt, max_tries AS maxTries,
  created_by_id AS createdById, cancel_requested_at IS NOT NULL AS isCancelRequested`;

// SKIP LOCKED is written out: Sequelize drops the option for MariaDB, and two runners would wait for each other.

/** Locks running jobs whose runner has not been heard of in time. */
export function lockExpired(tx: Tx, kinds: readonly string[], limit: number): Promise<readonly LeasedRow[]> {
  return select<LeasedRow>(
    `SELECT ${columns} FROM jobs
      WHERE state = 'running' AND lease_until < NOW(3) AND kind IN (:kinds)
      ORDER BY lease_until LIMIT :limit FOR UPDATE SKIP LOCKED`,
    { kinds, limit },
    tx,
  );
}

/** Locks queued jobs whose time has come, the most urgent first. */
export function lockDue(tx: Tx, kinds: readonly string[], limit: number): Promise<readonly LeasedRow[]> {
  return select<LeasedRow>(
    `SELECT ${columns} FROM jobs
      WHERE state = 'queued' AND run_after <= NOW(3) AND kind IN (:kinds)
      ORDER BY priority DESC, run_after, id LIMIT :limit FOR UPDATE SKIP LOCKED`,
    { kinds, limit },
    tx,
  );
}

/** Makes a locked job the owner's for `lease_s` seconds and counts the try. */
export async function take(tx: Tx, id: number, owner: string, lease_s: number): Promise<void> {
  await execute(
    `UPDATE jobs
        SET state = 'running', tries = tries + 1, lease_owner = :owner,
            lease_until = NOW(3) + INTERVAL :lease SECOND, started_at = COALESCE(started_at, NOW(3)),
            progress = 0, message = ''
      WHERE id = :id`,
    { id, owner, lease: lease_s },
    tx,
  );
}

/** Extends a lease. False when the job is no longer held so. */
export async function extendLease(hold: Hold, lease_s: number): Promise<boolean> {
  const rows = await execute(
    `UPDATE jobs SET lease_until = NOW(3) + INTERVAL :lease SECOND
      WHERE id = :id AND state = 'running' AND lease_owner = :owner AND tries = :attempt`,
    { ...hold, lease: lease_s },
    null,
  );
  return rows === 1;
}

export interface HeldRow {
  readonly id: number;
  readonly attempt: number;
  readonly isCancelRequested: 0 | 1;
}

/** What an owner holds, as the database has it. */
export function heldBy(owner: string): Promise<readonly HeldRow[]> {
  return select<HeldRow>(
    `SELECT id, tries AS attempt, cancel_requested_at IS NOT NULL AS isCancelRequested
       FROM jobs WHERE state = 'running' AND lease_owner = :owner`,
    { owner },
  );
}

/** Locks the job within the caller's transaction if it is still held so. */
export async function lockHeld(
  tx: Tx,
  hold: { publicId: string; owner: string; attempt: number },
): Promise<boolean> {
  const rows = await select(
    `SELECT id FROM jobs
      WHERE public_id = :publicId AND state = 'running' AND lease_owner = :owner AND tries = :attempt FOR UPDATE`,
    { ...hold },
    tx,
  );
  return rows.length === 1;
}

export async function writeProgress(hold: Hold, progress: number, message: string): Promise<void> {
  await execute(
    `UPDATE jobs SET progress = :progress, message = :message
      WHERE id = :id AND state = 'running' AND lease_owner = :owner AND tries = :attempt`,
    { ...hold, progress, message },
    null,
  );
}

export interface Requeue {
  /** Seconds until the next try. */
  readonly wait_s: number;
  /** Whether the try counts; one that a shutdown cut short does not. */
  readonly isCounted: boolean;
  /** JSON; null keeps the error of an earlier try. */
  readonly error: string | null;
}

/** Puts a held job back into the queue. False when it is no longer held so. */
export async function requeue(hold: Hold, how: Requeue): Promise<boolean> {
  const rows = await execute(
    `UPDATE jobs
        SET state = 'queued', lease_owner = NULL, lease_until = NULL, progress = 0, message = '',
            run_after = NOW(3) + INTERVAL :wait SECOND, tries = tries - :uncounted, error = COALESCE(:error, error)
      WHERE id = :id AND state = 'running' AND lease_owner = :owner AND tries = :attempt`,
    { ...hold, wait: how.wait_s, uncounted: how.isCounted ? 0 : 1, error: how.error },
    null,
  );
  return rows === 1;
}
