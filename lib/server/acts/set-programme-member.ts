import 'server-only';
import type { ProgrammeRole } from '@/lib/contracts/roles';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import { lockPerson } from '@/lib/server/data/people';
import { membersOf, setMember } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

interface Member {
  readonly programme: string;
  readonly person: string;
  readonly role: ProgrammeRole;
}

/** Makes a person a member of a programme, or gives a member another role. A principal investigator always remains. */
export async function setProgrammeMember(
  caller: PersonCaller,
  { programme: code, person: publicId, role }: Member,
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id } = await managedProgramme(caller, code, tx);
    const person = await lockPerson(publicId, tx);
    if (!person) throw new Fault('not-found', 'There is no such person.');
    const members = await membersOf([id], tx);
    const before = members.find(({ personId }) => personId === person.id);
    if (before?.role === role) return { programme: code };
    const leads = members.filter((member) => member.role === 'pi');
    if (before?.role === 'pi' && leads.length === 1) {
      throw new Fault(
        'conflict',
        `${before.name} is the only principal investigator. Name another one first.`,
      );
    }
    await setMember(id, person.id, role, tx);
    await recordAudit(tx, caller, {
      act: 'programme.member',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      before: before ? { person: person.name, role: before.role } : null,
      after: { person: person.name, role },
    });
    return { programme: code };
  });
}
