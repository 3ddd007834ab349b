import { rm } from 'node:fs/promises';
import path from 'node:path';
import type { Bench, BenchWorld, Figure } from './bench';
import { loadPlainly } from './plain-load';
import { peakMemory } from './peak-memory';
import { benchNight, forgetSet, takeTable, type BenchNight } from './bench-night';
import { million, writeTable } from './write-table';

/** A night of a wide-field camera, with positions only. */
const wideField = { frames: 20, stars: 100_000, hasNames: false };

/** An upload from its first byte to the matched set, as a worker's process does it, against LOAD DATA of the same file. */
export const upload: Bench = {
  name: 'upload',
  run: async (world) => {
    const night = await benchNight();
    await warmUp(world, night);
    const file = path.join(world.folder, 'million.csv');
    await writeTable(file, million);
    const before_s = await loadPlainly(file);
    const { seconds, growth_MiB } = await uploadAndCheck(night, file);
    const after_s = await loadPlainly(file);
    await rm(file);
    const wide = await wideFieldFigures(world, night);
    return [
      {
        name: 'upload of 1,000,000 rows, checked and matched, against LOAD DATA of the file',
        measured: seconds,
        baseline: (before_s + after_s) / 2,
        unit: 's',
        aim: 2.5,
      },
      {
        name: 'peak growth of memory meanwhile',
        measured: growth_MiB,
        baseline: null,
        unit: 'MiB',
        aim: 200,
      },
      ...wide,
    ];
  },
};

async function wideFieldFigures(world: BenchWorld, night: BenchNight): Promise<readonly Figure[]> {
  const file = path.join(world.folder, 'wide-field.csv');
  await writeTable(file, wideField);
  const { seconds, growth_MiB } = await uploadAndCheck(night, file);
  await rm(file);
  return [
    { name: 'upload of 2,000,000 rows by position', measured: seconds, baseline: null, unit: 's', aim: null },
    { name: 'peak growth of memory meanwhile', measured: growth_MiB, baseline: null, unit: 'MiB', aim: null },
  ];
}

/** What is loaded once and stays: modules, compiled code, connections. */
async function warmUp(world: BenchWorld, night: BenchNight): Promise<void> {
  const file = path.join(world.folder, 'small.csv');
  await writeTable(file, { frames: 2, stars: 1000, hasNames: true });
  await uploadAndCheck(night, file);
}

async function uploadAndCheck(
  night: BenchNight,
  file: string,
): Promise<{ readonly seconds: number; readonly growth_MiB: number }> {
  const memory = peakMemory();
  const begun_ms = performance.now();
  const set = await takeTable(night, file);
  const seconds = (performance.now() - begun_ms) / 1000;
  const growth_MiB = memory.stop();
  await forgetSet(set);
  return { seconds, growth_MiB };
}
