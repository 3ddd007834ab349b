import 'server-only';
import { database } from '@/db/connection';
import { select, type Tx } from './database';

type LoadedTable =
  | 'measurements'
  | 'measurement_stars'
  | 'measurement_flags'
  | 'solution_observations'
  | 'calibrated_magnitudes';

export interface RowLoad {
  /** A file that this process wrote: tab-separated, \N for NULL, backslash before tab, line feed and backslash. */
  readonly file: string;
  readonly rows: number;
  readonly table: LoadedTable;
  /** Columns in the order of the file; one that begins with @ is a variable for `set`. */
  readonly columns: readonly string[];
  /** Expressions for further columns, SQL of our own: no text from outside. */
  readonly set: Readonly<Record<string, string>>;
  /** The row that foreign keys refer to is there and stays: it is neither looked up nor held. */
  readonly isReferenceKnown?: boolean;
}

const name = /^@?[a-z_]+$/;

/**
 * Loads a file into a table within a transaction, some ten times as fast as INSERT. LOCAL turns errors into warnings and
 * skips what does not fit; here either every row arrives as it was written or the transaction fails.
 */
export async function loadRows(tx: Tx, load: RowLoad): Promise<void> {
  const names = [...load.columns, ...Object.keys(load.set)];
  if (!names.every((one) => name.test(one)))
    throw new Error(`A column's name is not plain: ${names.join(', ')}`);
  const set = Object.entries(load.set).map(([column, expression]) => `${column} = ${expression}`);
  const [result] = await database().query(
    `${load.isReferenceKnown === true ? 'SET STATEMENT foreign_key_checks = 0 FOR ' : ''}LOAD DATA LOCAL INFILE ${database().escape(load.file)} INTO TABLE ${load.table} CHARACTER SET utf8mb4
     FIELDS TERMINATED BY '\\t' ESCAPED BY '\\\\' LINES TERMINATED BY '\\n'
     (${load.columns.join(', ')})${set.length > 0 ? ` SET ${set.join(', ')}` : ''}`,
    { transaction: tx },
  );
  const { affectedRows, warningStatus } = result as { affectedRows?: number; warningStatus?: number };
  if (affectedRows === load.rows && warningStatus === 0) return;
  const warnings = await select<{ Message: string }>('SHOW WARNINGS LIMIT 3', {}, tx);
  const said = warnings.map((warning) => warning.Message).join('; ');
  throw new Error(
    `${load.table}: ${affectedRows ?? 'no'} of ${load.rows} rows loaded, ${warningStatus ?? '?'} warnings. ${said}`,
  );
}
