import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { revokeTokensOf } from '@/lib/server/data/api-tokens';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { endLinksOf } from '@/lib/server/data/one-time-links';
import { lockManagers, lockPerson, setDisabled } from '@/lib/server/data/people';
import { deleteSessionsOfPerson } from '@/lib/server/data/sessions';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Disables an account: sessions, API tokens and open links of the person end at once and do not come back. */
export async function disablePerson(
  caller: PersonCaller,
  { person: publicId }: { readonly person: string },
): Promise<{ readonly person: string }> {
  demand(caller, 'people.manage');
  return inTransaction(async (tx) => {
    const managers = await lockManagers(tx);
    if (!managers.includes(caller.personId)) {
      throw new Fault('conflict', 'You are no manager any more: somebody changed your roles just now.');
    }
    const person = await lockPerson(publicId, tx);
    if (!person) throw new Fault('not-found', 'There is no such person.');
    if (managers.every((id) => id === person.id)) {
      throw new Fault('conflict', 'This is the last manager. Make another person a manager first.');
    }
    if (!(await setDisabled(person.id, true, tx)))
      throw new Fault('conflict', 'The account is disabled already.');
    const sessions = await deleteSessionsOfPerson(person.id, null, tx);
    const tokens = await revokeTokensOf(person.id, tx);
    await endLinksOf(person.id, tx);
    await recordAudit(tx, caller, {
      act: 'person.disable',
      subjectKind: 'person',
      subjectId: publicId,
      before: { isDisabled: false },
      after: { isDisabled: true, sessionsEnded: sessions, tokensRevoked: tokens },
    });
    return { person: publicId };
  });
}
