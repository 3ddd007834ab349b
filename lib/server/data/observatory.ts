import 'server-only';
import { execute, insert, selectOne, type Tx } from './database';

export interface ObservatoryRow {
  readonly id: number;
  readonly name: string;
  readonly isDemo: boolean;
  /** As stored; lib/contracts/settings reads it. */
  readonly settings: unknown;
}

/** The one observatory of this installation, or null before the first manager. */
export async function observatory(tx: Tx | null = null): Promise<ObservatoryRow | null> {
  const row = await selectOne<Omit<ObservatoryRow, 'isDemo'> & { isDemo: number }>(
    `SELECT id, name, is_demo AS isDemo, settings FROM observatories ORDER BY id LIMIT 1`,
    {},
    tx,
  );
  return row && { ...row, isDemo: row.isDemo === 1 };
}

/** The observatory's row, held until the transaction ends. */
export async function lockObservatory(tx: Tx): Promise<ObservatoryRow | null> {
  await selectOne('SELECT id FROM observatories ORDER BY id LIMIT 1 FOR UPDATE', {}, tx);
  return observatory(tx);
}

export async function insertObservatory(name: string, tx: Tx): Promise<number> {
  return insert(`INSERT INTO observatories (name, settings) VALUES (:name, '{}')`, { name }, tx);
}

export async function updateObservatory(id: number, name: string, settings: object, tx: Tx): Promise<void> {
  await execute(
    'UPDATE observatories SET name = :name, settings = :settings WHERE id = :id',
    { id, name, settings: JSON.stringify(settings) },
    tx,
  );
}
