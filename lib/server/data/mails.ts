import 'server-only';
import { execute, selectOne, type Tx } from './database';

export interface MailRow {
  readonly publicId: string;
  readonly kind: string;
  readonly dedupeKey: string;
  readonly messageId: string;
  readonly recipient: string;
  readonly personId: number | null;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Writes a mail to the outbox, unless its cause has one already; returns the public id of the one that there is now. */
export async function insertMail(tx: Tx, mail: MailRow): Promise<string> {
  await execute(
    `INSERT INTO mails (public_id, kind, dedupe_key, message_id, recipient, person_id, subject, text, html, next_try_at)
     VALUES (:publicId, :kind, :dedupeKey, :messageId, :recipient, :personId, :subject, :text, :html, NOW(3))
     ON DUPLICATE KEY UPDATE id = id`,
    { ...mail },
    tx,
  );
  const row = await selectOne<{ publicId: string }>(
    'SELECT public_id AS publicId FROM mails WHERE dedupe_key = :key',
    { key: mail.dedupeKey },
    tx,
  );
  return row?.publicId ?? mail.publicId;
}

export interface DueMail {
  readonly publicId: string;
  readonly messageId: string;
  readonly recipient: string;
  readonly name: string | null;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly state: 'queued' | 'sent' | 'failed';
  readonly tries: number;
}

/**
 * Locks a mail until the transaction ends, so that no two processes can hand it over at the same time. Null when another
 * one has it, or there is none.
 */
export function lockMail(tx: Tx, publicId: string): Promise<DueMail | null> {
  return selectOne<DueMail>(
    `SELECT m.public_id AS publicId, m.message_id AS messageId, m.recipient, m.subject, m.text, m.html, m.state, m.tries,
            (SELECT p.name FROM people p WHERE p.id = m.person_id) AS name
       FROM mails m WHERE m.public_id = :publicId FOR UPDATE SKIP LOCKED`,
    { publicId },
    tx,
  );
}

/** The mail is with the SMTP server. An invitation's link works without a password, so it is not kept any longer. */
export async function markSent(tx: Tx, publicId: string): Promise<void> {
  await execute(
    `UPDATE mails
        SET state = 'sent', sent_at = NOW(3), tries = tries + 1, last_error = '',
            text = IF(kind = 'invitation', '', text), html = IF(kind = 'invitation', '', html)
      WHERE public_id = :publicId`,
    { publicId },
    tx,
  );
}

/** Keeps why a try failed; the mail stays queued. */
export async function noteMailTry(tx: Tx, publicId: string, error: string, wait_s: number): Promise<void> {
  await execute(
    `UPDATE mails SET tries = tries + 1, last_error = :error, next_try_at = NOW(3) + INTERVAL :wait SECOND
      WHERE public_id = :publicId AND state = 'queued'`,
    { publicId, error: error.slice(0, 500), wait: wait_s },
    tx,
  );
}

/** The mail will not be sent. */
export async function failMail(tx: Tx, publicId: string, reason: string): Promise<void> {
  await execute(
    `UPDATE mails SET state = 'failed', last_error = IF(last_error = '', :reason, last_error)
      WHERE public_id = :publicId AND state = 'queued'`,
    { publicId, reason: reason.slice(0, 500) },
    tx,
  );
}

/** A failed mail is to be tried again. */
export async function requeueMail(tx: Tx, publicId: string): Promise<void> {
  await execute(
    `UPDATE mails SET state = 'queued', last_error = '', next_try_at = NOW(3) WHERE public_id = :publicId AND state = 'failed'`,
    { publicId },
    tx,
  );
}
