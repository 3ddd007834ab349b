import 'server-only';
import type { Connection, QueryOptions } from 'mariadb';
import { database } from '@/db/connection';

/** Values of a row in the order of the columns: numbers and texts, null where there is none. */
export type RowArray = readonly (number | string | null)[];

/** Sequelize would have every value pass through a function of its own; the connector takes false for none. */
const asArrays = { rowsAsArray: true, typeCast: false } as unknown as Omit<QueryOptions, 'sql'>;

/**
 * Rows of a SELECT as plain arrays, for those that read millions: a prepared statement brings numbers as bytes instead of
 * digits, which is five to eight times as quick as rows that are parsed into objects. Ask in chunks by key, with `?` for
 * values: the connection is held for one chunk only, however slow the reader.
 */
export async function rowArrays(
  sql: string,
  values: readonly (number | string)[],
): Promise<readonly RowArray[]> {
  const { connectionManager } = database();
  const connection = await connectionManager.getConnection({ type: 'read' });
  try {
    return await (connection as Connection).execute<RowArray[]>({ ...asArrays, sql }, [...values]);
  } finally {
    connectionManager.releaseConnection(connection);
  }
}
