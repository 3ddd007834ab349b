import 'server-only';
import { insertToken } from '@/lib/server/data/api-tokens';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import { newApiToken } from '@/lib/server/identity/tokens';
import type { PersonCaller, TokenScope } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Wanted {
  readonly name: string;
  readonly scopes: readonly TokenScope[];
  /** Null: it does not expire. */
  readonly life_days: number | null;
}

/** Makes an API token of the caller; its text is returned here and never again. */
export async function makeToken(
  caller: PersonCaller,
  { name, scopes, life_days }: Wanted,
): Promise<{ readonly id: string; readonly token: string }> {
  demand(caller, 'token.make');
  const { token, hash } = newApiToken();
  const id = newPublicId();
  await inTransaction(async (tx) => {
    await insertToken({ publicId: id, personId: caller.personId, name, hash, scopes, life_days }, tx);
    await recordAudit(tx, caller, {
      act: 'token.make',
      subjectKind: 'token',
      subjectId: id,
      after: { name, scopes, life_days },
    });
  });
  return { id, token };
}
