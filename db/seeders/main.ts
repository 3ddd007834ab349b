import { closeDatabase, database } from '../connection';
import { seedDemo } from './demo/seed-demo';
import { seedReference } from './reference';

/** Loads what an installation begins with: `reference` always, `demo` for trying the program out. Running it again is safe. */
async function load(what: string | undefined): Promise<string> {
  switch (what) {
    case 'reference':
      return `Standard stars loaded: ${await seedReference(database())}.`;
    case 'demo': {
      const password = process.env['DEMO_PASSWORD'] ?? '';
      if (password === '') throw new Error('The environment variable DEMO_PASSWORD is not set.');
      return seedDemo(database(), { password, now: Date.now() });
    }
    default:
      throw new Error('Say what to load: reference or demo.');
  }
}

try {
  console.log(await load(process.argv[2]));
} finally {
  await closeDatabase();
}
