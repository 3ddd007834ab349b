import 'server-only';
import { execute, selectOne, type Tx } from './database';

export type LinkPurpose = 'invitation' | 'reset';

export interface LinkRow {
  readonly personId: number;
  readonly personPublicId: string;
  readonly name: string;
  readonly email: string;
  readonly purpose: LinkPurpose;
  readonly state: 'open' | 'used' | 'expired' | 'disabled';
}

/** The link of the hash with its person, or null. */
export async function linkOf(hash: string, tx: Tx | null = null): Promise<LinkRow | null> {
  return selectOne<LinkRow>(
    `SELECT p.id AS personId, p.public_id AS personPublicId, p.name, p.email, l.purpose,
            CASE WHEN l.used_at IS NOT NULL THEN 'used' WHEN p.disabled_at IS NOT NULL THEN 'disabled'
                 WHEN l.expires_at <= NOW(3) THEN 'expired' ELSE 'open' END AS state
       FROM one_time_links l JOIN people p ON p.id = l.person_id WHERE l.token_hash = :hash`,
    { hash },
    tx,
  );
}

/** Takes the link; false when it was used before or has expired. Of two at once, one gets true. */
export async function takeLink(hash: string, tx: Tx): Promise<boolean> {
  const used = await execute(
    `UPDATE one_time_links SET used_at = NOW(3)
      WHERE token_hash = :hash AND used_at IS NULL AND expires_at > NOW(3)`,
    { hash },
    tx,
  );
  return used === 1;
}

export interface NewLink {
  readonly personId: number;
  readonly purpose: LinkPurpose;
  readonly hash: string;
  readonly life_hours: number;
  readonly createdById: number | null;
}

/** Adds a link; the person's earlier ones end with it. */
export async function insertLink(link: NewLink, tx: Tx): Promise<void> {
  await endLinksOf(link.personId, tx);
  await execute(
    `INSERT INTO one_time_links (person_id, purpose, token_hash, expires_at, created_by_id)
     VALUES (:personId, :purpose, :hash, NOW(3) + INTERVAL :life_hours HOUR, :createdById)`,
    { ...link },
    tx,
  );
}

/** No unused link of the person works any more. */
export async function endLinksOf(personId: number, tx: Tx): Promise<void> {
  await execute(
    `UPDATE one_time_links SET expires_at = NOW(3)
      WHERE person_id = :personId AND used_at IS NULL AND expires_at > NOW(3)`,
    { personId },
    tx,
  );
}
