import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { observatory } from '@/lib/server/data/observatory';
import { lockPerson } from '@/lib/server/data/people';
import { makeOneTimeLink } from '@/lib/server/identity/one-time-link';
import { invitationMail } from '@/lib/server/mail/invitation';
import { postMail } from '@/lib/server/mail/post-mail';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Makes a new one-time link for a person who lost the password or the first link; it is mailed and returned. */
export async function makePersonLink(
  caller: PersonCaller,
  { person: publicId }: { readonly person: string },
): Promise<{ readonly link: string }> {
  demand(caller, 'people.manage');
  return inTransaction(async (tx) => {
    const person = await lockPerson(publicId, tx);
    if (!person) throw new Fault('not-found', 'There is no such person.');
    if (person.disabledAt) throw new Fault('conflict', 'The account is disabled: enable it first.');
    const isReset = person.passwordHash !== null;
    const purpose = isReset ? 'reset' : 'invitation';
    const made = await makeOneTimeLink(tx, { id: person.id, purpose, createdById: caller.personId });
    const place = (await observatory(tx))?.name ?? 'the observatory';
    await postMail(tx, {
      kind: 'invitation',
      dedupeKey: `invitation:${made.hash}`,
      to: { personId: person.id, email: person.email, name: person.name },
      ...invitationMail({ observatory: place, name: person.name, link: made.link, isReset }),
    });
    await recordAudit(tx, caller, {
      act: 'person.link',
      subjectKind: 'person',
      subjectId: publicId,
      after: { purpose },
    });
    return { link: made.link };
  });
}
