import type { Sequelize } from 'sequelize';
import { Observatory } from '../../models/observatory';
import { readDemoWorld } from './demo-world';
import { readDemoSky } from './demo-nights';
import { loadDemo } from './load-demo';
import { refreshPasswords } from './load-people';

export interface DemoOptions {
  /** The password of all demo accounts. */
  readonly password: string;
  /** Which night is in progress [ms since 1970]. */
  readonly now: number;
}

/**
 * Loads the demo into a database that has no observatory yet. Where the demo is there already, only the passwords are
 * brought up to the one given; whatever people did in it stays. Says what it did.
 */
export async function seedDemo(sequelize: Sequelize, { password, now }: DemoOptions): Promise<string> {
  const world = await readDemoWorld();
  const there = await Observatory.findOne();
  if (there !== null && !there.isDemo) {
    throw new Error(`This database belongs to ${there.name}: the demo is not loaded into it.`);
  }
  if (there !== null) {
    const changed = await sequelize.transaction((transaction) =>
      refreshPasswords(world.observatory.people, password, transaction),
    );
    return `The demo is there already; passwords changed: ${changed}.`;
  }
  const sky = await readDemoSky(world, true);
  const { tonight } = await loadDemo(sequelize, { world, sky, now, password });
  return `Demo loaded; the night in progress is that of ${tonight.night.date}.`;
}
