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
