import { afterAll, beforeAll, inject } from 'vitest';
import { closeDatabase } from '@/db/connection';
import { claimDatabase } from './claim-database';
import { emptyTables } from './database';
import { databaseEnvironment } from './environment';

// Each test file has a database to itself, and begins with it empty.
const { address, release } = await claimDatabase(inject('workerDatabases'));
// vitest sets BASE_URL to a path of its own meaning; here it is the address in links.
Object.assign(process.env, databaseEnvironment(address), { BASE_URL: 'http://evenfall.example' });

beforeAll(emptyTables);
afterAll(async () => {
  await closeDatabase();
  await release();
});
