import { afterAll, inject } from 'vitest';
import { closeDatabase } from '@/db/connection';
import { databaseEnvironment } from './environment';

// A test may look into the running application's database, and arrange things there, by the code of lib/server.
Object.assign(process.env, databaseEnvironment(inject('servedDatabase')), {
  DATA_DIR: inject('servedDataFolder'),
  BASE_URL: inject('baseUrl'),
});

afterAll(closeDatabase);
