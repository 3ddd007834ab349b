import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { caughtIds, caughtMail, type CaughtMail } from '@/lib/server/mail/caught-mails';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { environment } from '@/lib/server/settings/environment';

/** Most messages that the page lists. */
const shown = 100;

/** In the demo everybody who is signed in may read what the local catcher took; elsewhere there is no such place. */
function demandDemo(_caller: PersonCaller): string {
  const { isDemo, dataDir } = environment();
  if (isDemo) return dataDir;
  throw new Fault('not-found', 'There is a mail catcher in the demo only.');
}

export type CaughtMailListed = Pick<CaughtMail, 'id' | 'receivedAt' | 'to' | 'subject'>;

export interface CaughtMailList {
  readonly mails: readonly CaughtMailListed[];
  /** How many there are, the ones that are not listed included. */
  readonly total: number;
}

/** The messages that the demo's catcher took, the newest first. */
export async function caughtMails(caller: PersonCaller): Promise<CaughtMailList> {
  const folder = demandDemo(caller);
  const ids = await caughtIds(folder);
  const mails = await Promise.all(ids.slice(0, shown).map((id) => caughtMail(folder, id)));
  return {
    mails: mails.flatMap((mail) =>
      mail === null ? [] : [{ id: mail.id, receivedAt: mail.receivedAt, to: mail.to, subject: mail.subject }],
    ),
    total: ids.length,
  };
}

/** One message that the demo's catcher took. */
export async function readCaughtMail(caller: PersonCaller, id: string): Promise<CaughtMail> {
  const mail = await caughtMail(demandDemo(caller), id);
  if (!mail) throw new Fault('not-found', 'There is no such message, or it was let go for newer ones.');
  return mail;
}
