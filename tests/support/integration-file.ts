import { afterAll, beforeAll, inject } from 'vitest';
import { closeDatabase } from '@/db/connection';
import { emptyTables } from './database';
import { databaseEnvironment } from './environment';

// Each worker has a database of its own, and each test file begins with it empty.
const worker = Number(process.env['VITEST_POOL_ID'] ?? '1');
const address = inject('workerDatabases')[worker - 1];
if (address === undefined) throw new Error(`There is no database for worker ${worker}.`);
// vitest sets BASE_URL to a path of its own meaning; here it is the address in links.
Object.assign(process.env, databaseEnvironment(address), { BASE_URL: 'http://evenfall.example' });

beforeAll(emptyTables);
afterAll(closeDatabase);
