import { createWriteStream } from 'node:fs';
import { rm } from 'node:fs/promises';
import path from 'node:path';
import { finished } from 'node:stream/promises';
import { createConnection } from 'mariadb';
import { addressFromEnvironment, database } from '@/db/connection';
import { FrameInput } from '@/lib/contracts/api/frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newSolution, type TargetNight } from '@/tests/support/calibrated';
import { transformTargets } from '@/workers/handlers/transform-targets';
import type { Bench, BenchWorld, Figure } from './bench';
import { benchNight, runOf, takeTable } from './bench-night';
import { peakMemory } from './peak-memory';
import { million, writeTable } from './write-table';

/** The magnitudes of a night's targets from the stored measurements to the stored results, thread and all. */
export const transform: Bench = {
  name: 'transform',
  run: async (world) => {
    const { caller } = await benchNight();
    const night = await targetNight(caller);
    const file = path.join(world.folder, 'targets.csv');
    await writeTable(file, million);
    await takeTable({ caller, id: night.id }, file, { kind: 'target' });
    await rm(file);
    // The first loads modules and compiles, the second is measured.
    await transformOnce(caller, night);
    const before_s = await plainly(world);
    const { seconds, growth_MiB } = await transformOnce(caller, night);
    const after_s = await plainly(world);
    return figures(seconds, (before_s + after_s) / 2, growth_MiB);
  },
};

const figures = (seconds: number, plain_s: number, growth_MiB: number): readonly Figure[] => [
  {
    name: 'transformation of 1,000,000 measurements of 10,000 stars, stored, against reading them and LOAD DATA of the result',
    measured: seconds,
    baseline: plain_s,
    unit: 's',
    aim: null,
  },
  { name: 'peak growth of memory meanwhile', measured: growth_MiB, baseline: null, unit: 'MiB', aim: null },
];

/** A night whose frames see the stars of the table, in both bands. */
async function targetNight(caller: PersonCaller): Promise<TargetNight> {
  const { id } = await openNight(caller, { telescope: 'larkspur', date: '2026-11-05' });
  const start = Date.UTC(2026, 10, 6, 2);
  const inputs = Array.from({ length: million.frames }, (_, index) =>
    FrameInput.parse({
      ...{ type: 'target', object: 'Thistle 3', programme: 'MH26B-04', ra: 101, dec: 41, exposure: 60 },
      band: index % 2 === 0 ? 'V' : 'B',
      utc_start: new Date(start + index * 90_000).toISOString(),
    }),
  );
  await logFrames(caller, id, inputs, { origin: 'log', isList: true });
  return { id, zero: new Date(start) };
}

async function transformOnce(
  person: PersonCaller,
  night: TargetNight,
): Promise<{ readonly seconds: number; readonly growth_MiB: number }> {
  const programme = await selectOne<{ id: number }>(`SELECT id FROM programmes WHERE code = 'MH26B-04'`);
  const solution = await newSolution(night, { person, programmes: [programme?.id ?? null] });
  const memory = peakMemory();
  const begun_ms = performance.now();
  const run = runOf<'transform-targets'>('bench-transform', { solution, night: night.id });
  const { stars, measurements } = await transformTargets(run);
  const seconds = (performance.now() - begun_ms) / 1000;
  const growth_MiB = memory.stop();
  if (stars !== million.stars || measurements !== million.frames * million.stars)
    throw new Error(`Only ${stars} stars came of ${measurements} measurements.`);
  return { seconds, growth_MiB };
}

/**
 * Seconds for what no program can do without: every measurement's row through the same connector, one after the other,
 * and the rows of the latest result into a table like theirs by LOAD DATA of a file that is there already.
 */
async function plainly(world: BenchWorld): Promise<number> {
  const reading_s = await readMeasurements();
  const file = path.join(world.folder, 'stars.tsv');
  await writeResult(file);
  await database().query('CREATE TABLE plain_stars LIKE calibrated_magnitudes');
  const begun_ms = performance.now();
  await database().query(`LOAD DATA LOCAL INFILE ${database().escape(file)} INTO TABLE plain_stars`);
  const loading_s = (performance.now() - begun_ms) / 1000;
  await database().query('DROP TABLE plain_stars');
  await rm(file);
  return reading_s + loading_s;
}

async function readMeasurements(): Promise<number> {
  const connection = await createConnection({ ...addressFromEnvironment() });
  const begun_ms = performance.now();
  let rows = 0;
  const sql =
    'SELECT row_no, frame_id, star_no, inst_mag, inst_err, ra, decl, peak, flag_no FROM measurements';
  for await (const row of connection.queryStream({ sql, rowsAsArray: true })) rows += row === null ? 0 : 1;
  const seconds = (performance.now() - begun_ms) / 1000;
  await connection.end();
  if (rows !== million.frames * million.stars) throw new Error(`There are ${rows} measurements.`);
  return seconds;
}

async function writeResult(file: string): Promise<void> {
  const connection = await createConnection({ ...addressFromEnvironment() });
  const out = createWriteStream(file);
  const sql =
    'SELECT * FROM calibrated_magnitudes WHERE transformation_id = (SELECT MAX(transformation_id) FROM calibrated_magnitudes)';
  for await (const row of connection.queryStream({ sql, rowsAsArray: true })) {
    const cells = (row as readonly unknown[]).map((cell) => (cell === null ? '\\N' : String(cell)));
    out.write(`${cells.join('\t')}\n`);
  }
  out.end();
  await finished(out);
  await connection.end();
}
