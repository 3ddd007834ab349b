import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { insertObservatory, lockObservatory } from '@/lib/server/data/observatory';
import { insertPerson, managerExists, personByEmail, setRoles } from '@/lib/server/data/people';
import { newPublicId } from '@/lib/server/data/public-id';
import { makeOneTimeLink } from '@/lib/server/identity/one-time-link';
import type { JobCaller } from '@/lib/server/policy/caller';

interface FirstManager {
  readonly email: string;
  readonly name: string;
  /** Make one although there is a manager: for an observatory whose managers are all gone. */
  readonly isAnother: boolean;
}

/**
 * Makes a manager's account from the machine itself, where whoever may run it owns the database anyway, and returns the
 * one-time link that sets its password. A new installation gets its observatory with it.
 */
export async function inviteFirstManager(
  caller: JobCaller,
  { email, name, isAnother }: FirstManager,
): Promise<{ readonly link: string }> {
  return inTransaction(async (tx) => {
    if (!(await lockObservatory(tx))) await insertObservatory('Our observatory', tx);
    if (!isAnother && (await managerExists(tx))) {
      throw new Fault(
        'conflict',
        'There is a manager already, who can invite others. With --another one more is made.',
      );
    }
    const known = await personByEmail(email, tx);
    if (known?.passwordHash) {
      throw new Fault(
        'conflict',
        `There is an account for ${email} already; a manager can give it the role.`,
      );
    }
    // An invitation that nobody accepted in time is made again.
    const publicId = known?.publicId ?? newPublicId();
    const id = known?.id ?? (await insertPerson({ publicId, email, name }, tx));
    if (id === null)
      throw new Fault('conflict', `An account for ${email} was made at this moment. Try again.`);
    await setRoles(id, ['manager'], tx);
    const { link } = await makeOneTimeLink(tx, { id, purpose: 'invitation', createdById: null });
    await recordAudit(tx, caller, {
      act: 'person.invite',
      subjectKind: 'person',
      subjectId: publicId,
      reason: 'made on the command line',
      after: { email, name, roles: ['manager'] },
    });
    return { link };
  });
}
