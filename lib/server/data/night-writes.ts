import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { execute, insert, select, selectOne, type Tx } from './database';
import type { ObserverRow } from './nights';

interface NewNight {
  readonly publicId: string;
  readonly telescopeId: number;
  readonly date: string;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly openedById: number;
}

export interface ExistingNight {
  readonly publicId: string;
  readonly openedBy: string;
  readonly createdAt: Date;
}

/** The night of a telescope and date, whoever may see it: two cannot be opened. */
export async function nightOfDate(tx: Tx, telescopeId: number, date: string): Promise<ExistingNight | null> {
  return selectOne<ExistingNight>(
    `SELECT n.public_id AS publicId, p.name AS openedBy, n.created_at AS createdAt
       FROM nights n JOIN people p ON p.id = n.opened_by_id
      WHERE n.telescope_id = :telescopeId AND n.date = :date`,
    { telescopeId, date },
    tx,
  );
}

export async function insertNight(tx: Tx, night: NewNight): Promise<number> {
  return insert(
    `INSERT INTO nights (public_id, telescope_id, date, starts_at, ends_at, summary, opened_by_id)
     VALUES (:publicId, :telescopeId, :date, :startsAt, :endsAt, '', :openedById)`,
    { ...night },
    tx,
  );
}

/** People by public id, for a night's observers: each must be there, enabled and an observer. */
export async function observersByPublicId(
  tx: Tx,
  publicIds: readonly string[],
): Promise<readonly ObserverRow[]> {
  const wanted = [...new Set(publicIds)];
  if (wanted.length === 0) return [];
  const found = await select<ObserverRow>(
    `SELECT p.id AS personId, p.public_id AS publicId, p.name FROM people p
      WHERE p.public_id IN (:wanted) AND p.disabled_at IS NULL
        AND EXISTS (SELECT 1 FROM person_roles r WHERE r.person_id = p.id AND r.role = 'observer')
      ORDER BY p.name, p.id`,
    { wanted },
    tx,
  );
  const known = new Set(found.map(({ publicId }) => publicId));
  const issues = publicIds.flatMap((id, index) =>
    known.has(id) ? [] : [{ path: `observers.${index}`, value: id, message: 'is not an observer here' }],
  );
  if (issues.length > 0) throw new Fault('invalid-input', 'Not everybody named is an observer.', { issues });
  return found;
}

/** Makes the people the night's observers, and nobody else. */
export async function setObservers(tx: Tx, nightId: number, personIds: readonly number[]): Promise<void> {
  await execute('DELETE FROM night_observers WHERE night_id = :nightId', { nightId }, tx);
  if (personIds.length === 0) return;
  await execute(
    `INSERT INTO night_observers (night_id, person_id) SELECT :nightId, p.id FROM people p WHERE p.id IN (:personIds)`,
    { nightId, personIds },
    tx,
  );
}

/** Writes a new summary and counts the change; the caller holds the night. */
export async function touchNight(tx: Tx, nightId: number, summary: string | undefined): Promise<void> {
  await execute(
    'UPDATE nights SET summary = COALESCE(:summary, summary), version = version + 1 WHERE id = :nightId',
    { nightId, summary: summary ?? null },
    tx,
  );
}
