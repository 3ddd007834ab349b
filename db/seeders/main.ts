import { addressFromEnvironment, connect } from '../connection';
import { seedReference } from './reference';

/** Loads what an installation begins with: `reference` always, `demo` for trying the program out. Running it again is safe. */
async function main(what: string | undefined): Promise<void> {
  const sequelize = connect({ ...addressFromEnvironment(), connections: 2 });
  try {
    if (what === 'reference') console.log(`Standard stars loaded: ${await seedReference(sequelize)}.`);
    else throw new Error('Say what to load: reference or demo.');
  } finally {
    await sequelize.close();
  }
}

await main(process.argv[2]);
