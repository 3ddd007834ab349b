import 'server-only';
import type { TokenScope } from '@/lib/server/policy/caller';
import { execute, insert, select, type Tx } from './database';

/** Notes that a token was used, at most once a minute: reading must not become writing. */
export async function touchToken(tokenId: number): Promise<void> {
  await execute(
    `UPDATE api_tokens SET last_used_at = NOW(3)
      WHERE id = :tokenId AND (last_used_at IS NULL OR last_used_at < NOW(3) - INTERVAL 1 MINUTE)`,
    { tokenId },
    null,
  );
}

export interface NewToken {
  readonly publicId: string;
  readonly personId: number;
  readonly name: string;
  readonly hash: string;
  readonly scopes: readonly TokenScope[];
  /** Null: it does not expire. */
  readonly life_days: number | null;
}

export async function insertToken(token: NewToken, tx: Tx): Promise<void> {
  await insert(
    `INSERT INTO api_tokens (public_id, person_id, name, token_hash, scopes, expires_at)
     VALUES (:publicId, :personId, :name, :hash, :scopes, NOW(3) + INTERVAL :life_days DAY)`,
    { ...token, scopes: JSON.stringify(token.scopes) },
    tx,
  );
}

export interface TokenRow {
  readonly id: string;
  readonly name: string;
  readonly scopes: readonly TokenScope[];
  readonly createdAt: Date;
  readonly lastUsedAt: Date | null;
  readonly expiresAt: Date | null;
  readonly isExpired: boolean;
}

/** The person's tokens that are not revoked, newest first. */
export async function tokensOfPerson(personId: number): Promise<readonly TokenRow[]> {
  const rows = await select<Omit<TokenRow, 'isExpired'> & { isExpired: number | null }>(
    `SELECT public_id AS id, name, scopes, created_at AS createdAt, last_used_at AS lastUsedAt, expires_at AS expiresAt,
            expires_at <= NOW(3) AS isExpired
       FROM api_tokens WHERE person_id = :personId AND revoked_at IS NULL ORDER BY created_at DESC, id DESC`,
    { personId },
  );
  return rows.map((row) => ({ ...row, isExpired: row.isExpired === 1 }));
}

/** Whose token it is, and its name; null when there is none or it is revoked. */
export async function tokenOwner(
  publicId: string,
  tx: Tx,
): Promise<{ readonly personId: number; readonly name: string } | null> {
  const [row] = await select<{ personId: number; name: string }>(
    `SELECT person_id AS personId, name FROM api_tokens WHERE public_id = :publicId AND revoked_at IS NULL FOR UPDATE`,
    { publicId },
    tx,
  );
  return row ?? null;
}

/** Revokes a token; false when it was revoked before. */
export async function revokeToken(publicId: string, tx: Tx): Promise<boolean> {
  const revoked = await execute(
    'UPDATE api_tokens SET revoked_at = NOW(3) WHERE public_id = :publicId AND revoked_at IS NULL',
    { publicId },
    tx,
  );
  return revoked === 1;
}

/** Revokes all tokens of a person and says how many. */
export async function revokeTokensOf(personId: number, tx: Tx): Promise<number> {
  return execute(
    'UPDATE api_tokens SET revoked_at = NOW(3) WHERE person_id = :personId AND revoked_at IS NULL',
    { personId },
    tx,
  );
}
