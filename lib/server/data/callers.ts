import 'server-only';
import { selectOne } from './database';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import type { TokenScope } from '@/lib/server/policy/caller';

/** A person who may come in, with every role. */
export interface CallerRow {
  readonly personId: number;
  readonly publicId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly ObservatoryRole[];
  readonly programmes: readonly (readonly [number, ProgrammeRole])[];
}

interface Stored {
  readonly personId: number;
  readonly publicId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: string | null;
  readonly programmes: string | null;
}

/** The person's columns, roles and programmes in one statement; the person's alias is `p`. */
const columns = `p.id AS personId, p.public_id AS publicId, p.name, p.email,
  (SELECT GROUP_CONCAT(r.role) FROM person_roles r WHERE r.person_id = p.id) AS roles,
  (SELECT GROUP_CONCAT(m.programme_id, ':', m.role) FROM programme_members m WHERE m.person_id = p.id) AS programmes`;

const parts = (list: string | null): readonly string[] => (list === null ? [] : list.split(','));

const toCaller = (row: Stored): CallerRow => ({
  personId: row.personId,
  publicId: row.publicId,
  name: row.name,
  email: row.email,
  // The tables' checks hold these words to the roles there are.
  roles: parts(row.roles) as ObservatoryRole[],
  programmes: parts(row.programmes).map((entry): [number, ProgrammeRole] => {
    const [id = '', role = ''] = entry.split(':');
    return [Number(id), role as ProgrammeRole];
  }),
});

/** An enabled person by id, or null. */
export async function callerOfPerson(personId: number): Promise<CallerRow | null> {
  const row = await selectOne<Stored>(
    `SELECT ${columns} FROM people p WHERE p.id = :personId AND p.disabled_at IS NULL`,
    { personId },
  );
  return row && toCaller(row);
}

export interface SessionCaller {
  readonly expiresAt: Date;
  readonly personId: number;
  /** Null when the person has been disabled since. */
  readonly person: CallerRow | null;
}

/** The session that the hash names, with its person. */
export async function callerOfSession(hash: string): Promise<SessionCaller | null> {
  const row = await selectOne<Stored & { readonly expiresAt: Date; readonly isDisabled: number }>(
    `SELECT ${columns}, s.expires_at AS expiresAt, p.disabled_at IS NOT NULL AS isDisabled
       FROM sessions s JOIN people p ON p.id = s.person_id WHERE s.id = :hash`,
    { hash },
  );
  if (!row) return null;
  return { expiresAt: row.expiresAt, personId: row.personId, person: row.isDisabled ? null : toCaller(row) };
}

export interface TokenCaller {
  readonly tokenId: number;
  readonly scopes: readonly TokenScope[];
  readonly person: CallerRow;
}

/** The valid token that the hash names (not revoked, not expired, of an enabled person), with its person. */
export async function callerOfToken(hash: string): Promise<TokenCaller | null> {
  const row = await selectOne<Stored & { readonly tokenId: number; readonly scopes: readonly TokenScope[] }>(
    `SELECT ${columns}, t.id AS tokenId, t.scopes
       FROM api_tokens t JOIN people p ON p.id = t.person_id
      WHERE t.token_hash = :hash AND t.revoked_at IS NULL AND p.disabled_at IS NULL
        AND (t.expires_at IS NULL OR t.expires_at > NOW(3))`,
    { hash },
  );
  return row && { tokenId: row.tokenId, scopes: row.scopes, person: toCaller(row) };
}
