import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { DatabaseAddress } from '@/db/connection';
import { runChild } from './child';
import { databaseEnvironment } from './environment';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/** Arguments that run one of the project's TypeScript files the way the start script does. */
export const script = (file: string, ...args: readonly string[]): readonly string[] => [
  '--conditions=react-server',
  '--import',
  'tsx',
  file,
  ...args,
];

const run = (database: DatabaseAddress, args: readonly string[], extra: Record<string, string> = {}) =>
  runChild(process.execPath, args, {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'production', ...databaseEnvironment(database), ...extra },
  });

/** Applies every migration to an empty database. */
export async function migrateDatabase(database: DatabaseAddress): Promise<void> {
  await run(database, script('db/migrate.ts'));
}

/** Loads the reference data, then the demo, as the start script does. */
export async function seedDatabase(database: DatabaseAddress, env: Record<string, string>): Promise<void> {
  await run(database, script('db/seeders/main.ts', 'reference'), env);
  await run(database, script('db/seeders/main.ts', 'demo'), env);
}
