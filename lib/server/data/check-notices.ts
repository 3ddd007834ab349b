import 'server-only';
import { select, selectOne, type Tx } from './database';

export interface Addressee {
  readonly personId: number;
  readonly email: string;
  readonly name: string;
}

/** Everybody who is to hear that measurements wait. */
export async function photometrists(tx: Tx): Promise<readonly Addressee[]> {
  return select<Addressee>(
    `SELECT p.id AS personId, p.email, p.name FROM people p JOIN person_roles r ON r.person_id = p.id
      WHERE r.role = 'photometrist' AND p.disabled_at IS NULL ORDER BY p.id`,
    {},
    tx,
  );
}

export interface Uploader extends Addressee {
  readonly isDisabled: number;
}

export async function uploaderOf(personId: number, tx: Tx): Promise<Uploader | null> {
  return selectOne<Uploader>(
    `SELECT p.id AS personId, p.email, p.name, p.disabled_at IS NOT NULL AS isDisabled
       FROM people p WHERE p.id = :personId`,
    { personId },
    tx,
  );
}
