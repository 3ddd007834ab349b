import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import type { Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import { addressFromEnvironment, connect } from './connection';

/** What a migration may do: run statements. One change a file, because MariaDB commits each DDL statement at once. */
export type Migration = (context: { run: (sql: string) => Promise<void> }) => Promise<void>;

interface MigrationModule {
  readonly up: Migration;
  readonly down: Migration;
}

const folder = path.join(path.dirname(fileURLToPath(import.meta.url)), 'migrations');

/** Applies the migrations that the database has not seen, in the order of their numbers; returns their names. */
export async function migrate(sequelize: Sequelize): Promise<readonly string[]> {
  const run = async (sql: string): Promise<void> => {
    await sequelize.query(sql);
  };
  const files = (await readdir(folder)).filter((name) => name.endsWith('.ts')).sort();
  const umzug = new Umzug({
    migrations: files.map((file) => {
      const load = async (): Promise<MigrationModule> =>
        (await import(pathToFileURL(path.join(folder, file)).href)) as MigrationModule;
      return {
        name: path.basename(file, '.ts'),
        up: async () => (await load()).up({ run }),
        down: async () => (await load()).down({ run }),
      };
    }),
    storage: new SequelizeStorage({ sequelize, tableName: 'migrations' }),
    logger: undefined,
  });
  return (await umzug.up()).map(({ name }) => name);
}

async function main(): Promise<void> {
  const sequelize = connect({ ...addressFromEnvironment(), connections: 1 });
  try {
    const applied = await migrate(sequelize);
    console.log(applied.length === 0 ? 'Database is up to date.' : `Migrations applied: ${applied.length}.`);
  } finally {
    await sequelize.close();
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await main();
