import 'server-only';
import { execute, select, type Tx } from './database';

/** Sessions are known by the SHA-256 of their cookie; the cookie's value is never here. */
export interface SessionRow {
  readonly hash: string;
  readonly personId: number;
  readonly createdAt: Date;
  readonly expiresAt: Date;
  readonly userAgent: string;
}

export interface NewSession {
  readonly hash: string;
  readonly personId: number;
  readonly expiresAt: Date;
  readonly userAgent: string;
}

export async function insertSession(session: NewSession, tx: Tx | null): Promise<void> {
  await execute(
    `INSERT INTO sessions (id, person_id, expires_at, user_agent) VALUES (:hash, :personId, :expiresAt, :userAgent)`,
    { ...session, expiresAt: session.expiresAt.toISOString().slice(0, -1) },
    tx,
  );
}

export async function sessionsOfPerson(
  personId: number,
  tx: Tx | null = null,
): Promise<readonly SessionRow[]> {
  return select<SessionRow>(
    `SELECT id AS hash, person_id AS personId, created_at AS createdAt, expires_at AS expiresAt, user_agent AS userAgent
       FROM sessions WHERE person_id = :personId AND expires_at > NOW(3) ORDER BY created_at DESC`,
    { personId },
    tx,
  );
}

export async function extendSession(hash: string, expiresAt: Date, tx: Tx | null): Promise<void> {
  await execute(
    'UPDATE sessions SET expires_at = :expiresAt WHERE id = :hash',
    { hash, expiresAt: expiresAt.toISOString().slice(0, -1) },
    tx,
  );
}

/** Ends one session and says whether there was one. */
export async function deleteSession(hash: string, tx: Tx | null): Promise<boolean> {
  return (await execute('DELETE FROM sessions WHERE id = :hash', { hash }, tx)) > 0;
}

/** Ends all sessions of a person, but the one to keep if it is named, and says how many. */
export async function deleteSessionsOfPerson(
  personId: number,
  keep: string | null,
  tx: Tx | null,
): Promise<number> {
  return execute(
    'DELETE FROM sessions WHERE person_id = :personId AND (:keep IS NULL OR id <> :keep)',
    { personId, keep },
    tx,
  );
}

export async function deleteExpiredSessions(tx: Tx | null): Promise<number> {
  return execute('DELETE FROM sessions WHERE expires_at <= NOW(3)', {}, tx);
}

/** Ends a session that a list named by the first 16 digits of its hash; false when there is none. */
export async function deleteListedSession(personId: number, listedAs: string, tx: Tx): Promise<boolean> {
  const ended = await execute(
    'DELETE FROM sessions WHERE person_id = :personId AND LEFT(id, 16) = :listedAs',
    { personId, listedAs },
    tx,
  );
  return ended > 0;
}
