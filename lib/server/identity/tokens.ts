import 'server-only';
import { touchToken } from '@/lib/server/data/api-tokens';
import { callerOfToken, type TokenCaller } from '@/lib/server/data/callers';
import { newSecret, secretHash } from './secrets';

/** Says at a glance, in a log or a repository, whose key this is. */
const prefix = 'evf_';

/** A new API token: the text to show once, and what is kept of it. */
export function newApiToken(): { readonly token: string; readonly hash: string } {
  const token = newSecret(prefix);
  return { token, hash: secretHash(token) };
}

/** The person behind an API token, or null when it is unknown, revoked or expired, or its person disabled. */
export async function personOfToken(token: string): Promise<TokenCaller | null> {
  if (!token.startsWith(prefix)) return null;
  const found = await callerOfToken(secretHash(token));
  if (found) await touchToken(found.tokenId);
  return found;
}

/** The token in an Authorization header: null without the header, '' when it holds something else. */
export function bearerTokenIn(header: string | null): string | null {
  if (header === null) return null;
  return /^Bearer +(\S+) *$/i.exec(header)?.[1] ?? '';
}
