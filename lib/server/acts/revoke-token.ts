import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { revokeToken as revoke, tokenOwner } from '@/lib/server/data/api-tokens';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';

/** Revokes an API token for good: the caller's own, or anybody's by a manager. */
export async function revokeToken(
  caller: PersonCaller,
  { token }: { readonly token: string },
): Promise<{ readonly token: string }> {
  return inTransaction(async (tx) => {
    const found = await tokenOwner(token, tx);
    if (!found || !may(caller, 'token.revoke', { ownerId: found.personId })) {
      throw new Fault('not-found', 'There is no such token, or it is revoked already.');
    }
    await revoke(token, tx);
    await recordAudit(tx, caller, {
      act: 'token.revoke',
      subjectKind: 'token',
      subjectId: token,
      before: { name: found.name },
    });
    return { token };
  });
}
