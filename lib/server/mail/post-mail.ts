import 'server-only';
import { z } from 'zod';
import type { Tx } from '@/lib/server/data/database';
import { insertMail } from '@/lib/server/data/mails';
import { newPublicId } from '@/lib/server/data/public-id';
import { enqueue } from '@/lib/server/jobs/enqueue';
import type { JobCaller } from '@/lib/server/policy/caller';
import { environment } from '@/lib/server/settings/environment';
import { oneLine } from './one-line';

export type MailKind =
  | 'upload-refused'
  | 'measurements-waiting'
  | 'solution-proposed'
  | 'night-calibrated'
  | 'night-not-photometric'
  | 'invitation';

export interface NewMail {
  readonly kind: MailKind;
  /** One cause and one recipient: a second mail with this key is not written, ever. At most 160 characters. */
  readonly dedupeKey: string;
  readonly to: { readonly personId: number | null; readonly email: string; readonly name: string };
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Mails are the system's own: their jobs belong to nobody, so only managers see them. */
const system: JobCaller = { kind: 'job', jobId: 'mail', personId: null, requestId: 'mail' };

/**
 * Writes a mail to the outbox in the transaction of the change that it tells of, and queues its sending there too. Its
 * Message-ID is fixed now: should it ever be handed over twice, the receiver can tell that it is one mail.
 */
export async function postMail(tx: Tx, mail: NewMail): Promise<{ id: string }> {
  const publicId = newPublicId();
  const id = await insertMail(tx, {
    publicId,
    kind: mail.kind,
    dedupeKey: mail.dedupeKey,
    messageId: `<${publicId}@${senderDomain(environment().mailFrom)}>`,
    recipient: z.email().max(254).parse(mail.to.email),
    personId: mail.to.personId,
    subject: oneLine(mail.subject, 200),
    text: mail.text,
    html: mail.html,
  });
  if (id === publicId)
    await enqueue(tx, system, { kind: 'send-mail', payload: { mail: id }, dedupeKey: `send-mail:${id}` });
  return { id };
}

/** The domain of `Name <name@domain>` or of a bare address. */
export function senderDomain(from: string): string {
  const domain = /@([a-z0-9.-]+)>?\s*$/i.exec(from)?.[1];
  if (!domain) throw new Error(`MAIL_FROM is no e-mail address: ${from}`);
  return domain.toLowerCase();
}
