import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { deleteSessionsOfPerson } from '@/lib/server/data/sessions';
import { secretHash } from '@/lib/server/identity/secrets';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Ends all sessions of the caller but the one of the cookie. */
export async function endOtherSessions(
  caller: PersonCaller,
  { cookie }: { readonly cookie: string | null },
): Promise<{ readonly sessionsEnded: number }> {
  demand(caller, 'account.change');
  return inTransaction(async (tx) => {
    const keep = cookie === null ? null : secretHash(cookie);
    const sessionsEnded = await deleteSessionsOfPerson(caller.personId, keep, tx);
    await recordAudit(tx, caller, {
      act: 'sign-out',
      subjectKind: 'person',
      subjectId: caller.publicId,
      reason: 'all other sessions',
      after: { sessionsEnded },
    });
    return { sessionsEnded };
  });
}
