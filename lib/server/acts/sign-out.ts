import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { endSession } from '@/lib/server/identity/sessions';
import type { PersonCaller } from '@/lib/server/policy/caller';

/** Ends the session of the cookie for good. Signing out twice is no fault. */
export async function signOut(caller: PersonCaller, cookie: string): Promise<void> {
  await inTransaction(async (tx) => {
    if (!(await endSession(cookie, tx))) return;
    await recordAudit(tx, caller, { act: 'sign-out', subjectKind: 'person', subjectId: caller.publicId });
  });
}
