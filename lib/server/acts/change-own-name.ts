import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { setName } from '@/lib/server/data/people';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Changes the caller's own name, as others see it. */
export async function changeOwnName(
  caller: PersonCaller,
  { name }: { readonly name: string },
): Promise<{ readonly name: string }> {
  demand(caller, 'account.change');
  if (name === caller.name) return { name };
  await inTransaction(async (tx) => {
    await setName(caller.personId, name, tx);
    await recordAudit(tx, caller, {
      act: 'person.change',
      subjectKind: 'person',
      subjectId: caller.publicId,
      before: { name: caller.name },
      after: { name },
    });
  });
  return { name };
}
