import 'server-only';
import { Fault } from '@/lib/faults/fault';
import type { Scope } from '@/lib/server/policy/scope';
import { execute, select, type Tx } from './database';
import { inUseFault } from './set-holders';

interface FluxSet {
  readonly id: number;
  readonly name: string;
  readonly state: string;
  readonly hasMagnitudes: number;
}

/**
 * Brings magnitudes that were made from counts to a corrected exposure time: a magnitude is of counts per second. Sets
 * that gave magnitudes themselves do not depend on it. Refuses where a solution stands on the old values, and where a
 * set has counts and magnitudes beside each other, so that nobody can tell which rows came from counts.
 */
export async function rescaleFluxMagnitudes(
  tx: Tx,
  scope: Scope,
  frame: { readonly id: number; readonly number: number; readonly exposure: number },
  exposure: number,
): Promise<void> {
  if (exposure === frame.exposure || frame.exposure <= 0 || exposure <= 0) return;
  const sets = await select<FluxSet>(
    `SELECT s.id, s.name, s.state, JSON_EXISTS(s.mapping, '$.inst_mag') AS hasMagnitudes
       FROM measurement_set_frames u JOIN measurement_sets s ON s.id = u.set_id
      WHERE u.frame_id = :frameId AND JSON_EXISTS(s.mapping, '$.flux')`,
    { frameId: frame.id },
    tx,
  );
  const fixed = sets.find(({ state, hasMagnitudes }) => state === 'in use' || hasMagnitudes === 1);
  if (fixed?.state === 'in use') {
    const before = `the exposure time of frame ${frame.number}, with which its counts were made magnitudes, can be corrected`;
    throw await inUseFault(tx, scope, fixed, before);
  }
  if (fixed) {
    throw new Fault(
      'conflict',
      `Counts of the set “${fixed.name}” were made magnitudes with the exposure time of frame ${frame.number}, and it has magnitudes beside them, so it is not known which rows depend on it. The exposure cannot be corrected.`,
    );
  }
  const shift = 2.5 * Math.log10(exposure / frame.exposure);
  for (const { id } of sets) {
    await execute(
      'UPDATE measurements SET inst_mag = inst_mag + :shift WHERE set_id = :id AND frame_id = :frameId',
      { shift, id, frameId: frame.id },
      tx,
    );
  }
}
