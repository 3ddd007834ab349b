import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { stopChild } from './child';
import { freePort } from './free-port';
import { decideDemoNights, migrateDatabase, seedDatabase, startProgram } from './scripts';
import { startApplication } from './server';
import { returnDatabaseServer, takeDatabaseServer } from './shared-database-server';

const demoPassword = 'a demo password for tests';

/** Before the api and the browser tests: a database with reference data and the demo, and the built application on it. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = await takeDatabaseServer();
  const database = await server.createDatabase(`evenfall_${project.name}`);
  const dataFolder = await mkdtemp(path.join(tmpdir(), 'evenfall-data-'));
  const mailPort = String(await freePort());
  const env = {
    EVENFALL_DEMO: '1',
    DEMO_PASSWORD: demoPassword,
    DATA_DIR: dataFolder,
    MAIL_CATCHER_PORT: mailPort,
    SMTP_URL: `smtp://127.0.0.1:${mailPort}`,
  };
  await migrateDatabase(database);
  await seedDatabase(database, env);
  const catcher = startProgram(database, 'workers/mail-catcher.ts', env);
  const application = await startApplication({ database, dataFolder, env });
  await decideDemoNights(database, env);

  project.provide('baseUrl', application.baseUrl);
  project.provide('servedDatabase', database);
  project.provide('servedDataFolder', dataFolder);
  project.provide('demoPassword', demoPassword);
  return async () => {
    await application.stop();
    await stopChild(catcher);
    await rm(dataFolder, { recursive: true, force: true });
    await returnDatabaseServer();
  };
}
