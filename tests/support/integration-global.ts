import type { TestProject } from 'vitest/node';
import { copyTables } from './database-copy';
import { migrateDatabase } from './scripts';
import { returnDatabaseServer, takeDatabaseServer } from './shared-database-server';

const template = 'evenfall_template';

/** Before the integration tests: every migration on an empty database, then a copy of its tables for each worker. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = await takeDatabaseServer();
  await migrateDatabase(await server.createDatabase(template));
  const root = await server.administrator();
  // One more than workers: the process of a finished file may not be quite gone yet.
  const workers = Number(project.config.maxWorkers) + 1;
  const names = Array.from({ length: workers }, (_, index) => `evenfall_worker_${index + 1}`);
  for (const name of names) await copyTables(root, template, name);
  await root.end();
  project.provide(
    'workerDatabases',
    names.map((name) => server.address(name)),
  );
  return returnDatabaseServer;
}
