import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { closeDatabase } from '@/db/connection';
import { startDatabaseServer } from '@/tests/support/database-server';
import { databaseEnvironment } from '@/tests/support/environment';
import { migrateDatabase, seedReferenceData } from '@/tests/support/scripts';
import type { Bench, Figure } from './bench';
import { download } from './download.bench';
import { engine } from './engine.bench';
import { figureTable, isMet } from './figure-table';
import { latency } from './latency.bench';
import { solve } from './solve.bench';
import { transform } from './transform.bench';
import { upload } from './upload.bench';

/** In this order; every bench cleans up after itself. */
const benches: readonly Bench[] = [upload, latency, engine, transform, download, solve];

/** Runs the benches whose names hold one of the words given, all without words. */
async function main(words: readonly string[]): Promise<number> {
  const chosen = benches.filter(
    ({ name }) => words.length === 0 || words.some((word) => name.includes(word)),
  );
  const folder = await mkdtemp(path.join(tmpdir(), 'evenfall-bench-'));
  const server = await startDatabaseServer();
  const figures: Figure[] = [];
  try {
    const address = await server.createDatabase('evenfall_bench');
    Object.assign(process.env, databaseEnvironment(address), { DATA_DIR: folder, LOG_LEVEL: 'warn' });
    await migrateDatabase(address);
    // The connector sends a whole file as one packet of the protocol; the plain load is one large file.
    const administrator = await server.administrator();
    await administrator.query('SET GLOBAL max_allowed_packet = 1073741824');
    await administrator.end();
    await seedReferenceData(address);
    for (const bench of chosen) {
      console.log(`${bench.name} …`);
      figures.push(...(await bench.run({ server, folder })));
    }
  } finally {
    await closeDatabase();
    await server.dispose();
    await rm(folder, { recursive: true, force: true });
  }
  console.log(figureTable(figures));
  return figures.every((figure) => isMet(figure) !== false) ? 0 : 1;
}

process.exit(await main(process.argv.slice(2)));
