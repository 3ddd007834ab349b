import 'server-only';
import type { ObservatoryRole } from '@/lib/contracts/roles';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { lockManagers, lockPerson, rolesOf, setName, setRoles } from '@/lib/server/data/people';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Changed {
  readonly person: string;
  readonly name: string;
  readonly roles: readonly ObservatoryRole[];
}

/** Changes a person's name and roles. A manager who can act always remains. */
export async function changePerson(
  caller: PersonCaller,
  { person: publicId, name, roles }: Changed,
): Promise<{ readonly person: string }> {
  demand(caller, 'people.manage');
  return inTransaction(async (tx) => {
    const managers = await lockManagers(tx);
    if (!managers.includes(caller.personId)) {
      throw new Fault('conflict', 'You are no manager any more: somebody changed your roles just now.');
    }
    const person = await lockPerson(publicId, tx);
    if (!person) throw new Fault('not-found', 'There is no such person.');
    const before = { name: person.name, roles: await rolesOf(person.id, tx) };
    const losesRole = before.roles.includes('manager') && !roles.includes('manager');
    if (losesRole && managers.every((id) => id === person.id)) {
      throw new Fault('conflict', 'This is the last manager. Make another person a manager first.');
    }
    const after = { name, roles: [...roles].sort() };
    if (JSON.stringify(before) === JSON.stringify(after)) return { person: publicId };
    await setName(person.id, name, tx);
    await setRoles(person.id, roles, tx);
    await recordAudit(tx, caller, {
      act: 'person.change',
      subjectKind: 'person',
      subjectId: publicId,
      before,
      after,
    });
    return { person: publicId };
  });
}
