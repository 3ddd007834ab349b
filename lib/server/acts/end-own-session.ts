import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { deleteListedSession } from '@/lib/server/data/sessions';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Ends one of the caller's own sessions, by the beginning of its hash. */
export async function endOwnSession(
  caller: PersonCaller,
  { session }: { readonly session: string },
): Promise<{ readonly session: string }> {
  demand(caller, 'account.change');
  return inTransaction(async (tx) => {
    if (!(await deleteListedSession(caller.personId, session, tx))) {
      throw new Fault('not-found', 'It has ended already.');
    }
    await recordAudit(tx, caller, {
      act: 'sign-out',
      subjectKind: 'person',
      subjectId: caller.publicId,
      reason: 'ended from another session',
    });
    return { session };
  });
}
