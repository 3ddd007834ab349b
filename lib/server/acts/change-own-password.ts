import 'server-only';
import { passwordIssues } from '@/lib/contracts/password';
import { Fault, isFault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { endLinksOf } from '@/lib/server/data/one-time-links';
import { setPassword } from '@/lib/server/data/people';
import { deleteSessionsOfPerson } from '@/lib/server/data/sessions';
import { checkPassword } from '@/lib/server/identity/check-password';
import { hashPassword } from '@/lib/server/identity/password';
import { secretHash } from '@/lib/server/identity/secrets';
import type { PersonCaller, Visitor } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Wanted {
  readonly current: string;
  readonly password: string;
  readonly repeated: string;
  /** Who tries: the present password is asked for, and slowed, as at the door. */
  readonly visitor: Visitor;
  /** The session that stays; all others end. */
  readonly cookie: string | null;
}

/** Changes the caller's own password and ends the person's other sessions. */
export async function changeOwnPassword(
  caller: PersonCaller,
  { current, password, repeated, visitor, cookie }: Wanted,
): Promise<{ readonly sessionsEnded: number }> {
  demand(caller, 'account.change');
  const issues = [...passwordIssues(password, [caller.name, caller.email])];
  if (password !== repeated)
    issues.push({ path: 'repeated', message: 'is not the same as the new password' });
  if (password === current)
    issues.push({ path: 'password', message: 'It is the password that you have now.' });
  if (issues.length > 0) throw new Fault('invalid-input', 'The new password will not do.', { issues });
  await demandOwnPassword(visitor, caller, current);
  const hash = await hashPassword(password);
  return inTransaction(async (tx) => {
    await setPassword(caller.personId, hash, tx);
    await endLinksOf(caller.personId, tx);
    const keep = cookie === null ? null : secretHash(cookie);
    const sessionsEnded = await deleteSessionsOfPerson(caller.personId, keep, tx);
    await recordAudit(tx, caller, {
      act: 'person.password',
      subjectKind: 'person',
      subjectId: caller.publicId,
      after: { sessionsEnded },
    });
    return { sessionsEnded };
  });
}

async function demandOwnPassword(visitor: Visitor, caller: PersonCaller, password: string): Promise<void> {
  try {
    await checkPassword(visitor, { email: caller.email, password });
  } catch (cause) {
    // Said of the field, for the person is signed in; waits and everything else pass as they are.
    if (!isFault(cause, 'not-signed-in')) throw cause;
    throw new Fault('invalid-input', 'The present password is wrong.', {
      issues: [
        { path: 'current', message: cause.message.replace('The e-mail address or the password', 'It') },
      ],
      cause,
    });
  }
}
