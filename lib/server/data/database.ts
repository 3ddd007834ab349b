import 'server-only';
import { AsyncLocalStorage } from 'node:async_hooks';
import { QueryTypes, Transaction } from 'sequelize';
import { database } from '@/db/connection';

export { closeDatabase } from '@/db/connection';

export type Tx = Transaction;
export type SqlValue = string | number | boolean | Date | Buffer | null | readonly (string | number)[];
export type SqlValues = Readonly<Record<string, SqlValue>>;

type InTransaction = (tx: Tx) => Promise<void>;
const companion = new AsyncLocalStorage<InTransaction>();

/** Runs `work`; every transaction within it also does `also`, just before it commits. */
export function withCompanion<T>(also: InTransaction, work: () => Promise<T>): Promise<T> {
  return companion.run(also, work);
}

/** Runs `work` in one transaction: all of it happens, or nothing. */
export function inTransaction<T>(work: (tx: Tx) => Promise<T>): Promise<T> {
  return database().transaction(
    { isolationLevel: Transaction.ISOLATION_LEVELS.READ_COMMITTED },
    async (tx) => {
      const result = await work(tx);
      await companion.getStore()?.(tx);
      return result;
    },
  ) as Promise<T>;
}

/**
 * Rows of a SELECT with named `:values`.
 * `type` is given because the connector's result cannot be read without it (Sequelize 6 with mariadb 3).
 */
export async function select<Row extends object>(
  sql: string,
  values: SqlValues = {},
  tx: Tx | null = null,
): Promise<readonly Row[]> {
  return database().query<Row>(sql, {
    type: QueryTypes.SELECT,
    replacements: values as Record<string, unknown>,
    transaction: tx,
  });
}

/** The first row of a SELECT, or null. */
export async function selectOne<Row extends object>(
  sql: string,
  values: SqlValues = {},
  tx: Tx | null = null,
): Promise<Row | null> {
  return (await select<Row>(sql, values, tx))[0] ?? null;
}

/** Runs an INSERT, UPDATE or DELETE and returns how many rows it touched. */
export async function execute(sql: string, values: SqlValues, tx: Tx | null): Promise<number> {
  const [result] = await database().query(sql, {
    replacements: values as Record<string, unknown>,
    transaction: tx,
  });
  return (result as { affectedRows?: number }).affectedRows ?? 0;
}

/** Runs an INSERT and returns the id it made. */
export async function insert(sql: string, values: SqlValues, tx: Tx | null): Promise<number> {
  const [result] = await database().query(sql, {
    replacements: values as Record<string, unknown>,
    transaction: tx,
  });
  return Number((result as { insertId?: number | bigint }).insertId ?? result);
}
