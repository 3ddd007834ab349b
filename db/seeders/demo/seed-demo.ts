import type { Sequelize } from 'sequelize';
import { tonightFiles } from '@/lib/contracts/demo-files';
import { keepDemoFile } from '@/lib/server/storage/demo-files';
import { Observatory } from '../../models/observatory';
import { observeTonight, readDemoSky, withHole, type DemoSky } from './demo-nights';
import { readDemoWorld, type DemoWorld } from './demo-world';
import { loadDemo, type DemoTonightLog } from './load-demo';
import { refreshPasswords } from './load-people';
import { measure } from './make-files';
import { newFramesTable, nightTables, type Files } from './sample-uploads';
import { uploadSamples } from './upload-samples';

export interface DemoOptions {
  /** The password of all demo accounts. */
  readonly password: string;
  /** Which night is in progress [ms since 1970]. */
  readonly now: number;
}

/**
 * Loads the demo into a database that has no observatory yet: all of it in one transaction, then its uploads by the
 * application's own acts. Where the demo is there already, only passwords are brought up to the one given and uploads
 * that are missing are made; whatever people did in it stays. Says what it did.
 */
export async function seedDemo(sequelize: Sequelize, { password, now }: DemoOptions): Promise<string> {
  const world = await readDemoWorld();
  const there = await Observatory.findOne();
  if (there !== null && !there.isDemo) {
    throw new Error(`This database belongs to ${there.name}: the demo is not loaded into it.`);
  }
  const done =
    there === null
      ? await loadNew(sequelize, world, { password, now })
      : await refresh(sequelize, world, password);
  const [observer = ''] = world.nights.tonight.observers;
  return `${done} Tables uploaded: ${await uploadSamples(observer)}.`;
}

async function loadNew(
  sequelize: Sequelize,
  world: DemoWorld,
  { password, now }: DemoOptions,
): Promise<string> {
  const sky = await readDemoSky(world, true);
  const observed = observeTonight(world, sky, now);
  const { logged, missing } = withHole(observed.frames);
  const log = { tonight: { ...observed, frames: logged }, missing };
  // First the files, which can be written again: once the rows are there, the demo counts as loaded.
  for (const [name, content] of tonightTables(log, sky)) await keepDemoFile(name, content);
  await loadDemo(sequelize, { world, sky, password, ...log });
  return `Demo loaded; the night in progress is that of ${observed.night.date}.`;
}

/** Sample tables of the night in progress, whose frames depend on the hour at which the demo is loaded. */
function tonightTables({ tonight, missing }: DemoTonightLog, sky: DemoSky): Files {
  const whole = measure({ ...tonight, frames: [...tonight.frames, ...missing] }, sky);
  const isMissing = new Set(missing.map(({ number }) => number));
  const logged = whole.filter(({ frame }) => !isMissing.has(frame.number));
  const unlogged = whole.filter(({ frame }) => isMissing.has(frame.number));
  return new Map([
    ...nightTables('tonight', logged),
    ...(missing.length === 0 ? [] : newFramesTable(tonightFiles.newFrames, unlogged)),
  ]);
}

async function refresh(sequelize: Sequelize, world: DemoWorld, password: string): Promise<string> {
  const changed = await sequelize.transaction((transaction) =>
    refreshPasswords(world.observatory.people, password, transaction),
  );
  return `The demo is there already; passwords changed: ${changed}.`;
}
