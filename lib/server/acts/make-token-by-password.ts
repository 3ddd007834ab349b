import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { insertToken } from '@/lib/server/data/api-tokens';
import { inTransaction } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import { checkPassword, type Credentials } from '@/lib/server/identity/check-password';
import { newApiToken } from '@/lib/server/identity/tokens';
import type { TokenScope, Visitor } from '@/lib/server/policy/caller';

/** A forgotten script's key dies with the year. */
const life_days = 365;

interface Wanted extends Credentials {
  readonly name: string;
  readonly scopes: readonly TokenScope[];
}

/** Makes an API token for whoever knows the password; slowed after failures as sign-in is. The text is shown only here. */
export async function makeTokenByPassword(
  visitor: Visitor,
  wanted: Wanted,
): Promise<{ readonly token: string }> {
  const person = await checkPassword(visitor, wanted);
  const { token, hash } = newApiToken();
  const publicId = newPublicId();
  const { name, scopes } = wanted;
  await inTransaction(async (tx) => {
    await insertToken({ publicId, personId: person.id, name, hash, scopes, life_days }, tx);
    await recordAudit(
      tx,
      { personId: person.id, requestId: visitor.requestId },
      {
        act: 'token.make',
        subjectKind: 'token',
        subjectId: publicId,
        after: { name, scopes, life_days, by: 'password' },
      },
    );
  });
  return { token };
}
