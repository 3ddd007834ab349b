import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { checkPassword, type Credentials } from '@/lib/server/identity/check-password';
import { endSession, startSession } from '@/lib/server/identity/sessions';
import type { Visitor } from '@/lib/server/policy/caller';

export interface SignedIn {
  /** The session cookie's value, for the browser alone. */
  readonly cookie: string;
  readonly light: string;
}

/** Begins a session by e-mail address and password; the browser's former session, if any, ends with it. */
export async function signIn(
  visitor: Visitor,
  credentials: Credentials,
  formerCookie: string | null = null,
): Promise<SignedIn> {
  const person = await checkPassword(visitor, credentials);
  return inTransaction(async (tx) => {
    if (formerCookie) await endSession(formerCookie, tx);
    const cookie = await startSession(person.id, visitor.userAgent, tx);
    await recordAudit(
      tx,
      { personId: person.id, requestId: visitor.requestId },
      {
        act: 'sign-in',
        subjectKind: 'person',
        subjectId: person.publicId,
        after: { address: visitor.address },
      },
    );
    return { cookie, light: person.light };
  });
}
