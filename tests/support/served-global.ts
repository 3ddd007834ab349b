import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { migrateDatabase, seedDatabase } from './scripts';
import { startApplication } from './server';
import { returnDatabaseServer, takeDatabaseServer } from './shared-database-server';

const demoPassword = 'a demo password for tests';

/** Before the api and the browser tests: a database with reference data and the demo, and the built application on it. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = await takeDatabaseServer();
  const database = await server.createDatabase(`evenfall_${project.name}`);
  const dataFolder = await mkdtemp(path.join(tmpdir(), 'evenfall-data-'));
  const env = { EVENFALL_DEMO: '1', DEMO_PASSWORD: demoPassword, DATA_DIR: dataFolder };
  await migrateDatabase(database);
  await seedDatabase(database, env);
  const application = await startApplication({ database, dataFolder, env });

  project.provide('baseUrl', application.baseUrl);
  project.provide('servedDatabase', database);
  project.provide('servedDataFolder', dataFolder);
  project.provide('demoPassword', demoPassword);
  return async () => {
    await application.stop();
    await rm(dataFolder, { recursive: true, force: true });
    await returnDatabaseServer();
  };
}
