import { QueryTypes } from 'sequelize';
import { database } from '@/db/connection';

/** Tables that hold rows, other than the record of migrations. */
async function tablesWithRows(): Promise<readonly string[]> {
  const tables = await database().query<{ name: string }>(
    `SELECT table_name AS name FROM information_schema.tables
      WHERE table_schema = DATABASE() AND table_type = 'BASE TABLE' AND table_name <> 'migrations'`,
    { type: QueryTypes.SELECT },
  );
  if (tables.length === 0) return [];
  const probes = tables.map(
    ({ name }) => `SELECT '${name}' AS name, EXISTS (SELECT 1 FROM \`${name}\`) AS used`,
  );
  const rows = await database().query<{ name: string; used: number }>(probes.join(' UNION ALL '), {
    type: QueryTypes.SELECT,
  });
  return rows.filter(({ used }) => Number(used) === 1).map(({ name }) => name);
}

/** Removes every row of this test's database. Every file of the integration tests begins so. */
export async function emptyTables(): Promise<void> {
  const used = await tablesWithRows();
  if (used.length === 0) return;
  await database().transaction(async (transaction) => {
    await database().query('SET foreign_key_checks = 0', { transaction });
    for (const name of used) await database().query(`DELETE FROM \`${name}\``, { transaction });
    await database().query('SET foreign_key_checks = 1', { transaction });
  });
}
