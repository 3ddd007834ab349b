import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { lockPerson, setDisabled } from '@/lib/server/data/people';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Enables a disabled account: its password and roles hold again; tokens and sessions are made anew. */
export async function enablePerson(
  caller: PersonCaller,
  { person: publicId }: { readonly person: string },
): Promise<{ readonly person: string }> {
  demand(caller, 'people.manage');
  return inTransaction(async (tx) => {
    const person = await lockPerson(publicId, tx);
    if (!person) throw new Fault('not-found', 'There is no such person.');
    if (!(await setDisabled(person.id, false, tx)))
      throw new Fault('conflict', 'The account is enabled already.');
    await recordAudit(tx, caller, {
      act: 'person.enable',
      subjectKind: 'person',
      subjectId: publicId,
      before: { isDisabled: true },
      after: { isDisabled: false },
    });
    return { person: publicId };
  });
}
