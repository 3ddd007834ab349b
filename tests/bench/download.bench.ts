import { rm } from 'node:fs/promises';
import path from 'node:path';
import { addressFromEnvironment } from '@/db/connection';
import { CalibratedQuery } from '@/lib/contracts/api/calibrated';
import { openNight } from '@/lib/server/acts/open-night';
import { execute } from '@/lib/server/data/database';
import { streamOf } from '@/lib/server/http/stream-of';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { calibratedDownload } from '@/lib/server/reads/calibrated-download';
import { runChild } from '@/tests/support/child';
import { newResult, newSolution } from '@/tests/support/results';
import type { Bench, BenchWorld } from './bench';
import { benchNight } from './bench-night';
import { peakMemory } from './peak-memory';

const nStars = 1_000_000;

/** A night's magnitudes as the interface streams them, against the database's own client writing the same rows to a file. */
export const download: Bench = {
  name: 'download',
  run: async (world) => {
    const { caller } = await benchNight();
    const { id } = await openNight(caller, { telescope: 'larkspur', date: '2026-11-06' });
    const result = await millionStars(caller, id);
    await readAll(caller, id);
    const before_s = await dump(world, result);
    const memory = peakMemory();
    const begun_ms = performance.now();
    await readAll(caller, id);
    const seconds = (performance.now() - begun_ms) / 1000;
    const growth_MiB = memory.stop();
    const after_s = await dump(world, result);
    await execute('DELETE FROM calibrated_magnitudes WHERE transformation_id = :result', { result }, null);
    return [
      {
        name: 'download of 1,000,000 stars as CSV, read twice for the checksum, against mariadb --quick --batch of the rows',
        measured: seconds,
        baseline: (before_s + after_s) / 2,
        unit: 's',
        aim: null,
      },
      { name: 'peak growth of memory meanwhile', measured: growth_MiB, baseline: null, unit: 'MiB', aim: 64 },
    ];
  },
};

async function millionStars(by: PersonCaller, night: string): Promise<number> {
  const signed = { by, proposedBy: by, approvedBy: by };
  const solution = await newSolution({ night, number: 1, state: 'approved', ...signed });
  const result = await newResult({ solution, night, programme: null });
  const errors = '0.0031, 0.0042';
  await execute(
    `INSERT INTO calibrated_magnitudes
       (transformation_id, star_no, star, ra, decl, n_u, n_b, n_v, n_r, n_i, v, v_random, v_systematic, b, b_random, b_systematic,
        bv, bv_random, bv_systematic, ub, ub_random, ub_systematic, vr, vr_random, vr_systematic, vi, vi_random, vi_systematic,
        bjd_tdb, airmass, flags)
     SELECT :result, seq, CONCAT('T3-', seq), 100 + seq / 500000.7, 40 + seq / 500000.3, 9, 10, 11, 12, 13,
            10 + seq / 130000.1, ${errors}, 11 + seq / 130000.1, ${errors}, 0.61 + seq / 9e7, ${errors},
            0.12 + seq / 9e7, ${errors}, 0.33 + seq / 9e7, ${errors}, 0.71 + seq / 9e7, ${errors},
            2461348.5 + seq / 1e7, 1.2 + seq / 1e7, seq MOD 512
       FROM seq_1_to_${nStars}`,
    { result },
    null,
  );
  return result;
}

/** Reads the file as the network would, piece by piece, and keeps nothing of it. */
async function readAll(caller: PersonCaller, night: string): Promise<void> {
  const { text } = await calibratedDownload(caller, night, CalibratedQuery.parse({ format: 'csv' }));
  const newline = '\n'.charCodeAt(0);
  let lines = 0;
  for await (const piece of streamOf(text)) for (const byte of piece) if (byte === newline) lines += 1;
  if (lines <= nStars) throw new Error(`The file has only ${lines} lines.`);
}

async function dump({ folder }: BenchWorld, result: number): Promise<number> {
  const { host, port, user, password, database } = addressFromEnvironment();
  const file = path.join(folder, 'dump.tsv');
  const sql = `SELECT * FROM calibrated_magnitudes WHERE transformation_id = ${result}`;
  const command = 'exec mariadb --quick --batch -h "$1" -P "$2" -u "$3" -e "$4" "$5" > "$6"';
  const begun_ms = performance.now();
  await runChild('sh', ['-c', command, 'sh', host, String(port), user, sql, database, file], {
    env: { ...process.env, MYSQL_PWD: password },
  });
  const seconds = (performance.now() - begun_ms) / 1000;
  await rm(file);
  return seconds;
}
