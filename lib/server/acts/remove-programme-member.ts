import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import { membersOf, removeMember } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

interface Removed {
  readonly programme: string;
  readonly person: string;
}

/** Takes a person out of a programme: access to its data ends at once. The only principal investigator stays. */
export async function removeProgrammeMember(
  caller: PersonCaller,
  { programme: code, person }: Removed,
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id } = await managedProgramme(caller, code, tx);
    const members = await membersOf([id], tx);
    const member = members.find((one) => one.person === person);
    if (!member) throw new Fault('not-found', 'This person is no member of the programme.');
    if (member.role === 'pi' && members.filter(({ role }) => role === 'pi').length === 1) {
      throw new Fault(
        'conflict',
        `${member.name} is the only principal investigator. Name another one first.`,
      );
    }
    await removeMember(id, member.personId, tx);
    await recordAudit(tx, caller, {
      act: 'programme.member',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      before: { person: member.name, role: member.role },
      after: { person: member.name, role: null },
    });
    return { programme: code };
  });
}
