import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { inTransaction } from '@/lib/server/data/database';
import { failMail, lockMail, markSent, noteMailTry, type DueMail } from '@/lib/server/data/mails';
import { oneLine } from '@/lib/server/mail/one-line';
import { mailTransport, smtpFailure } from '@/lib/server/mail/transport';
import type { JobCaller } from '@/lib/server/policy/caller';
import { environment } from '@/lib/server/settings/environment';

/**
 * Hands one mail of the outbox to the SMTP server and marks it sent.
 *
 * The mail's row stays locked from before the handing over until its state is committed, so no second process can send
 * it meanwhile. What remains is the moment between the server's acceptance and the commit: a process that dies right
 * there sends the mail again later. Nothing but the one UPDATE lies in that moment, and the Message-ID is the same, by
 * which a receiver drops the second copy.
 */
export async function sendQueuedMail(
  _caller: JobCaller,
  id: string,
  wait_s: number,
): Promise<{ messageId: string }> {
  const outcome = await inTransaction(async (tx) => {
    const mail = await lockMail(tx, id);
    if (!mail) throw new Fault('unavailable', 'Another process is sending this mail just now.');
    if (mail.state !== 'queued') return { mail, failure: null };
    const refusal = await handOver(mail);
    if (!refusal) {
      await markSent(tx, id);
      return { mail, failure: null };
    }
    const failure = smtpFailure(refusal);
    await noteMailTry(tx, id, oneLine(failure.reason, 500), wait_s);
    if (failure.isPermanent) await failMail(tx, id, failure.reason);
    return { mail, failure: { ...failure, cause: refusal } };
  });
  if (!outcome.failure) return { messageId: outcome.mail.messageId };
  const { isPermanent, reason, cause } = outcome.failure;
  throw new Fault(isPermanent ? 'unprocessable' : 'unavailable', oneLine(reason, 500), { cause });
}

/** Null when the server has taken the mail, otherwise why it has not. */
async function handOver(mail: DueMail): Promise<Error | null> {
  const transport = mailTransport();
  if (!transport) return new Error('there is none: SMTP_URL is not set');
  try {
    await transport.sendMail({
      messageId: mail.messageId,
      from: environment().mailFrom,
      to: { name: oneLine(mail.name ?? '', 120), address: mail.recipient },
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      headers: { 'Auto-Submitted': 'auto-generated' },
      // What we write is all there is to fetch.
      disableFileAccess: true,
      disableUrlAccess: true,
    });
    return null;
  } catch (error) {
    // What the SMTP server says is the mail's outcome, and is kept with it.
    return error as Error;
  }
}
