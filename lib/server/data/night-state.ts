import 'server-only';
import type { NightState } from '@/lib/contracts/api/night';
import { Fault } from '@/lib/faults/fault';
import { execute, selectOne, type SqlValues, type Tx } from './database';
import { lastChangeWords } from './last-change';

interface NightIdentity {
  readonly id: number;
  readonly publicId: string;
  readonly date: string;
}

export interface LockedNight {
  readonly state: NightState;
  readonly version: number;
}

/** Holds the night for this transaction: whoever else changes it, or logs into it, waits. */
export async function lockNight(tx: Tx, night: NightIdentity): Promise<LockedNight> {
  const locked = await selectOne<LockedNight>(
    'SELECT state, version FROM nights WHERE id = :id FOR UPDATE',
    { id: night.id },
    tx,
  );
  if (!locked) throw new Fault('not-found', 'There is no such night, or it is not yours to see.');
  return locked;
}

/** The act that brought a night into a state, for the refusal's words. */
const actsInto: Readonly<Record<NightState, readonly string[]>> = {
  open: ['night.open', 'night.reopen'],
  closed: ['night.close'],
  calibrated: ['night.calibrate'],
};
const stateWords: Readonly<Record<NightState, string>> = {
  open: 'is open: it was opened',
  closed: 'is closed: it was closed',
  calibrated: 'is calibrated: its solution was approved',
};

async function standing(tx: Tx, night: NightIdentity, state: NightState): Promise<string> {
  const who = await lastChangeWords(tx, { kind: 'night', publicId: night.publicId }, actsInto[state]);
  return `The night of ${night.date} ${stateWords[state]}${who}.`;
}

/** Locks a night that is to be written into; a night that is not open takes nothing. */
export async function lockOpenNight(tx: Tx, night: NightIdentity): Promise<LockedNight> {
  const locked = await lockNight(tx, night);
  if (locked.state === 'open') return locked;
  const words = await standing(tx, night, locked.state);
  throw new Fault('conflict', `${words} Open it again, with a reason, to add or correct anything.`);
}

/** Refuses a change by somebody who has not seen the present night. */
export async function demandNightVersion(
  tx: Tx,
  night: NightIdentity,
  locked: LockedNight,
  version: number | undefined,
): Promise<void> {
  if (version === undefined || version === locked.version) return;
  const who = await lastChangeWords(tx, { kind: 'night', publicId: night.publicId }, [
    'night.open',
    'night.close',
    'night.reopen',
    'night.change',
    'night.calibrate',
  ]);
  throw new Fault(
    'stale',
    `The night was changed${who} since you read it. Look at it again, then repeat yours.`,
    {
      issues: [{ path: 'version', value: String(locked.version), message: 'is the present version' }],
    },
  );
}

export interface NightMove {
  readonly from: readonly NightState[];
  readonly to: NightState;
  /** The version that the person saw, if they say so. */
  readonly version?: number | undefined;
  /** Columns that change with the state. */
  readonly set?: SqlValues;
}

/**
 * The one way in which a night's state changes. Of two at once, one waits for the other's commit and is then refused
 * with the name of who was first. Returns the state before.
 */
export async function moveNight(tx: Tx, night: NightIdentity, move: NightMove): Promise<NightState> {
  const locked = await lockNight(tx, night);
  if (!move.from.includes(locked.state)) throw new Fault('conflict', await standing(tx, night, locked.state));
  await demandNightVersion(tx, night, locked, move.version);
  const set = move.set ?? {};
  const columns = Object.keys(set).map((column) => `, ${column} = :${column}`);
  const touched = await execute(
    `UPDATE nights SET state = :toState, version = version + 1${columns.join('')}
      WHERE id = :nightId AND state = :fromState AND version = :seenVersion`,
    { ...set, toState: move.to, nightId: night.id, fromState: locked.state, seenVersion: locked.version },
    tx,
  );
  // Cannot happen under the lock; if it does, the lock is broken, and nothing may go on.
  if (touched !== 1) throw new Fault('conflict', await standing(tx, night, locked.state));
  return locked.state;
}
