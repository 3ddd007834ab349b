import type { SpawnOptions } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { DatabaseAddress } from '@/db/connection';
import { runChild, startChild, type Child } from './child';
import { databaseEnvironment } from './environment';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

type Variables = Readonly<Record<string, string>>;

/** Arguments that run one of the project's TypeScript files the way the start script does. */
export const script = (file: string, ...args: readonly string[]): readonly string[] => [
  '--conditions=react-server',
  '--import',
  'tsx',
  file,
  ...args,
];

/** vitest sets BASE_URL to a path of its own meaning; here it is the address in links. */
const { BASE_URL: _ofVitest, ...outer } = process.env;

const optionsFor = (database: DatabaseAddress, env: Variables): SpawnOptions => ({
  cwd: root,
  env: { ...outer, NODE_ENV: 'production', ...databaseEnvironment(database), ...env },
});

const run = (database: DatabaseAddress, args: readonly string[], env: Variables = {}): Promise<string> =>
  runChild(process.execPath, args, optionsFor(database, env));

/** Starts one of the project's programs that run until they are stopped. */
export function startProgram(database: DatabaseAddress, file: string, env: Variables): Child {
  return startChild(process.execPath, script(file), optionsFor(database, env));
}

/** Applies every migration to an empty database. */
export async function migrateDatabase(database: DatabaseAddress): Promise<void> {
  await run(database, script('db/migrate.ts'));
}

/** Loads the reference data, as the start script does. */
export async function seedReferenceData(database: DatabaseAddress): Promise<void> {
  await run(database, script('db/seeders/main.ts', 'reference'));
}

/** Loads the reference data, then the demo, as the start script does. */
export async function seedDatabase(database: DatabaseAddress, env: Variables): Promise<void> {
  await seedReferenceData(database);
  await run(database, script('db/seeders/main.ts', 'demo'), env);
}

/** Brings the demo's nights to where its people have come, as the start script does once the application runs. */
export async function decideDemoNights(database: DatabaseAddress, env: Variables): Promise<void> {
  await run(database, script('db/seeders/main.ts', 'demo-decisions'), env);
}
