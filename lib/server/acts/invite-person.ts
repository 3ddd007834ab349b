import 'server-only';
import type { ObservatoryRole } from '@/lib/contracts/roles';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { observatory } from '@/lib/server/data/observatory';
import { insertPerson, setRoles } from '@/lib/server/data/people';
import { newPublicId } from '@/lib/server/data/public-id';
import { makeOneTimeLink } from '@/lib/server/identity/one-time-link';
import { invitationMail } from '@/lib/server/mail/invitation';
import { postMail } from '@/lib/server/mail/post-mail';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Invited {
  readonly email: string;
  readonly name: string;
  readonly roles: readonly ObservatoryRole[];
}

/** Makes an account and the one-time link by which its person sets a password; the link is mailed and returned. */
export async function invitePerson(
  caller: PersonCaller,
  { email, name, roles }: Invited,
): Promise<{ readonly person: string; readonly link: string }> {
  demand(caller, 'people.manage');
  const publicId = newPublicId();
  return inTransaction(async (tx) => {
    const id = await insertPerson({ publicId, email, name }, tx);
    if (id === null) {
      throw new Fault('conflict', 'There is an account for this e-mail address already.', {
        issues: [{ path: 'email', value: email, message: 'has an account already' }],
      });
    }
    await setRoles(id, roles, tx);
    const { link, hash } = await makeOneTimeLink(tx, {
      id,
      purpose: 'invitation',
      createdById: caller.personId,
    });
    const place = (await observatory(tx))?.name ?? 'the observatory';
    await postMail(tx, {
      kind: 'invitation',
      dedupeKey: `invitation:${hash}`,
      to: { personId: id, email, name },
      ...invitationMail({ observatory: place, name, link, isReset: false }),
    });
    await recordAudit(tx, caller, {
      act: 'person.invite',
      subjectKind: 'person',
      subjectId: publicId,
      after: { email, name, roles },
    });
    return { person: publicId, link };
  });
}
