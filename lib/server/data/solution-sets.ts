import 'server-only';
import type { MeasurementSetState } from '@/lib/contracts/measurement-kinds';
import { execute, select, type Tx } from './database';
import { moveSet } from './measurement-sets';

interface UsedSet {
  readonly id: number;
  readonly publicId: string;
  readonly name: string;
  readonly state: MeasurementSetState;
}

/** The sets that a solution rests on or was used for, each once, held for the transaction. */
export async function lockSetsOf(tx: Tx, solutionId: number): Promise<readonly UsedSet[]> {
  return select<UsedSet>(
    `SELECT m.id, m.public_id AS publicId, m.name, m.state FROM measurement_sets m
      WHERE m.id IN (SELECT q.set_id FROM solution_sets q WHERE q.solution_id = :solutionId)
      ORDER BY m.id FOR UPDATE`,
    { solutionId },
    tx,
  );
}

/** From now on nobody can take these sets back. */
export async function takeIntoUse(tx: Tx, sets: readonly UsedSet[]): Promise<void> {
  for (const set of sets) {
    if (set.state === 'matched') await moveSet(tx, set, { from: ['matched'], to: 'in use' });
  }
}

/**
 * Sets of a withdrawn solution that no other solution holds can be taken back again. A draft holds none: it keeps a copy
 * of what it saw. One that was replaced holds its own: its magnitudes can still be read.
 */
export async function releaseSets(tx: Tx, solutionId: number): Promise<void> {
  for (const set of await lockSetsOf(tx, solutionId)) {
    if (set.state !== 'in use') continue;
    const holders = await select(
      `SELECT s.id FROM solution_sets q JOIN solutions s ON s.id = q.solution_id
        WHERE q.set_id = :setId AND s.id <> :solutionId AND s.state IN ('proposed', 'approved', 'superseded') LIMIT 1`,
      { setId: set.id, solutionId },
      tx,
    );
    if (holders.length === 0) await moveSet(tx, set, { from: ['in use'], to: 'matched' });
  }
}

/** Notes the sets of a night that hold its targets: they are in use as long as the solution's magnitudes are. */
export async function addTargetSets(tx: Tx, solutionId: number, nightId: number): Promise<void> {
  await execute(
    `INSERT IGNORE INTO solution_sets (solution_id, set_id, purpose)
     SELECT :solutionId, m.id, 'targets' FROM measurement_sets m
      WHERE m.night_id = :nightId AND m.kind IN ('target', 'mixed') AND m.state IN ('matched', 'in use')`,
    { solutionId, nightId },
    tx,
  );
}
