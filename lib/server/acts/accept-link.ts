import 'server-only';
import { passwordIssues } from '@/lib/contracts/password';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { linkOf, takeLink, type LinkRow } from '@/lib/server/data/one-time-links';
import { setPassword } from '@/lib/server/data/people';
import { deleteSessionsOfPerson } from '@/lib/server/data/sessions';
import { hashPassword } from '@/lib/server/identity/password';
import { secretHash } from '@/lib/server/identity/secrets';
import { startSession } from '@/lib/server/identity/sessions';
import type { Visitor } from '@/lib/server/policy/caller';

interface Accepted {
  readonly token: string;
  readonly password: string;
  readonly repeated: string;
}

const refusals: Readonly<Record<Exclude<LinkRow['state'], 'open'>, string>> = {
  used: 'This link has been used. Sign in with the password that was set by it, or ask a manager for a new link.',
  expired: 'This link has expired. Ask a manager for a new one.',
  disabled: 'This account is disabled. A manager of the observatory can enable it.',
};

/** Sets the password by a one-time link, which ends with it, and signs the person in; older sessions end. */
export async function acceptLink(
  visitor: Visitor,
  { token, password, repeated }: Accepted,
): Promise<{ readonly cookie: string }> {
  const hash = secretHash(token);
  const link = await linkOf(hash);
  demandOpen(link);
  const issues = passwordIssues(password, [link.name, link.email]);
  if (password !== repeated) {
    throw new Fault('invalid-input', 'The two passwords differ.', {
      issues: [...issues, { path: 'repeated', message: 'is not the same as the password' }],
    });
  }
  if (issues.length > 0) throw new Fault('invalid-input', 'This password will not do.', { issues });
  const passwordHash = await hashPassword(password);
  return inTransaction(async (tx) => {
    // Of two who open the link at once, one takes it.
    if (!(await takeLink(hash, tx))) throw new Fault('conflict', refusals.used);
    await setPassword(link.personId, passwordHash, tx);
    await deleteSessionsOfPerson(link.personId, null, tx);
    const cookie = await startSession(link.personId, visitor.userAgent, tx);
    await recordAudit(
      tx,
      { personId: link.personId, requestId: visitor.requestId },
      {
        act: 'link.accept',
        subjectKind: 'person',
        subjectId: link.personPublicId,
        after: { purpose: link.purpose, address: visitor.address },
      },
    );
    return { cookie };
  });
}

function demandOpen(link: LinkRow | null): asserts link is LinkRow {
  if (!link)
    throw new Fault('not-found', 'There is no such link. It may have been cut short when it was copied.');
  if (link.state !== 'open') throw new Fault('conflict', refusals[link.state]);
}
