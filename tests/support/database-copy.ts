import type { Connection } from 'mariadb';

/** Makes `target` a database with the tables of `template`, foreign keys and checks included, and no rows. */
export async function copyTables(root: Connection, template: string, target: string): Promise<void> {
  await root.query(`CREATE OR REPLACE DATABASE \`${target}\``);
  await root.query(`USE \`${target}\``);
  // The tables come in the order of their names, so a foreign key may name one that is not there yet.
  await root.query('SET foreign_key_checks = 0');
  const tables: readonly { name: string }[] = await root.query(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ?',
    [template],
  );
  for (const { name } of tables) {
    const [row]: readonly Record<string, string>[] = await root.query(
      `SHOW CREATE TABLE \`${template}\`.\`${name}\``,
    );
    await root.query(row?.['Create Table'] ?? '');
  }
  await root.query('SET foreign_key_checks = 1');
}
