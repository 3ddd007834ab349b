import 'server-only';
import { execute, selectOne, type Tx } from './database';

export interface StoredAnswer {
  readonly fingerprint: string;
  /** Null while the first request still runs; `doneUnanswered` once its change is in and its answer is not. */
  readonly status: number | null;
  readonly body: string | null;
}

/** The status of a request whose change has been committed and whose answer has not been kept. */
export const doneUnanswered = 0;

/** Kept for two days: longer than any link stays down in a night. */
const keep_hours = 48;
/** A request that has not answered by then died with its process. */
const abandoned_s = 120;

/** Takes the key for this request; returns null when it is ours, or what is known of the earlier request. */
export async function takeKey(
  personId: number,
  key: string,
  fingerprint: string,
): Promise<StoredAnswer | null> {
  const values = { person: personId, key, fingerprint, keep: keep_hours, abandoned: abandoned_s };
  await execute(
    `DELETE FROM idempotency_keys
      WHERE person_id = :person AND idempotency_key = :key
        AND (expires_at < NOW(3) OR (status IS NULL AND created_at < NOW(3) - INTERVAL :abandoned SECOND))`,
    values,
    null,
  );
  const taken = await execute(
    `INSERT IGNORE INTO idempotency_keys (person_id, idempotency_key, fingerprint, expires_at)
     VALUES (:person, :key, :fingerprint, NOW(3) + INTERVAL :keep HOUR)`,
    values,
    null,
  );
  if (taken === 1) return null;
  return selectOne<StoredAnswer>(
    'SELECT fingerprint, status, body FROM idempotency_keys WHERE person_id = :person AND idempotency_key = :key',
    values,
  );
}

/**
 * Notes, in the transaction of the change itself, that the request is done. From then on the key is not free, even if
 * the process dies before the answer is kept: the change is never made twice.
 */
export async function markDone(tx: Tx, personId: number, key: string): Promise<void> {
  await execute(
    `UPDATE idempotency_keys SET status = :status
      WHERE person_id = :person AND idempotency_key = :key AND status IS NULL`,
    { person: personId, key, status: doneUnanswered },
    tx,
  );
}

/** Keeps the answer for whoever sends the key again. */
export async function storeAnswer(
  personId: number,
  key: string,
  status: number,
  body: string,
): Promise<void> {
  await execute(
    'UPDATE idempotency_keys SET status = :status, body = :body WHERE person_id = :person AND idempotency_key = :key',
    { person: personId, key, status, body },
    null,
  );
}

/** Frees the key of a request that changed nothing, so that it can be sent again. */
export async function freeKey(personId: number, key: string): Promise<void> {
  await execute(
    'DELETE FROM idempotency_keys WHERE person_id = :person AND idempotency_key = :key AND status IS NULL',
    { person: personId, key },
    null,
  );
}
