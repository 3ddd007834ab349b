import { closeDatabase, database } from '../connection';
import { decideNights } from './demo/decide-nights';
import { seedDemo } from './demo/seed-demo';
import { seedReference } from './reference';

/**
 * Loads what an installation begins with: `reference` always, `demo` for trying the program out, and `demo-decisions` once
 * the application runs, whose jobs they need. Running it again is safe.
 */
async function load(what: string | undefined): Promise<string> {
  switch (what) {
    case 'reference':
      return `Standard stars loaded: ${await seedReference(database())}.`;
    case 'demo': {
      const password = process.env['DEMO_PASSWORD'] ?? '';
      if (password === '') throw new Error('The environment variable DEMO_PASSWORD is not set.');
      return seedDemo(database(), { password, now: Date.now() });
    }
    case 'demo-decisions':
      return decideNights(database(), {
        photometrist: 'photometrist@evenfall.example',
        approver: 'photometrist2@evenfall.example',
        patience_ms: 120_000,
      });
    default:
      throw new Error('Say what to load: reference, demo or demo-decisions.');
  }
}

try {
  console.log(await load(process.argv[2]));
} finally {
  await closeDatabase();
}
