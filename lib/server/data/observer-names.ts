import 'server-only';
import { select } from './database';

export interface ObserverName {
  readonly id: string;
  readonly name: string;
}

/** Everybody who can be a night's observer, by name. */
export async function observerNames(): Promise<readonly ObserverName[]> {
  return select<ObserverName>(
    `SELECT p.public_id AS id, p.name FROM people p JOIN person_roles r ON r.person_id = p.id
      WHERE r.role = 'observer' AND p.disabled_at IS NULL ORDER BY p.name, p.id`,
  );
}
