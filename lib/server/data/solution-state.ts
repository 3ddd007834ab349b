import 'server-only';
import type { SolutionState } from '@/lib/contracts/api/solution';
import { Fault } from '@/lib/faults/fault';
import { execute, select, selectOne, type SqlValues, type Tx } from './database';
import { lastChangeWords } from './last-change';

interface SolutionIdentity {
  readonly id: number;
  readonly publicId: string;
  readonly number: number;
}

export interface LockedSolution {
  readonly state: SolutionState;
  readonly version: number;
  readonly outcome: 'determined' | 'undetermined' | null;
  readonly proposedById: number | null;
}

/**
 * Holds a solution for this transaction. Whoever changes states holds the night first (`lockNight`), so that two
 * changes of one night follow each other and cannot wait for one another.
 */
export async function lockSolution(tx: Tx, solution: SolutionIdentity): Promise<LockedSolution> {
  const locked = await selectOne<LockedSolution>(
    'SELECT state, version, outcome, proposed_by_id AS proposedById FROM solutions WHERE id = :id FOR UPDATE',
    { id: solution.id },
    tx,
  );
  if (!locked) throw new Error(`The solution ${solution.id} is gone: solutions are never deleted.`);
  return locked;
}

/** The act that brought a solution into a state, for the refusal's words. */
const actsInto: Readonly<Record<SolutionState, string>> = {
  draft: 'solution.queue',
  proposed: 'solution.propose',
  approved: 'solution.approve',
  superseded: 'solution.supersede',
  withdrawn: 'solution.withdraw',
};
const stateWords: Readonly<Record<SolutionState, string>> = {
  draft: 'is a draft: it was queued',
  proposed: 'is proposed: it was proposed',
  approved: 'is approved: it was approved',
  superseded: 'is superseded: a later one was approved',
  withdrawn: 'is withdrawn: it was withdrawn',
};

/** What state a solution is in and who brought it there. */
async function standing(tx: Tx, solution: SolutionIdentity, state: SolutionState): Promise<string> {
  const who = await lastChangeWords(tx, subjectOf(solution), [actsInto[state]]);
  return `Solution ${solution.number} ${stateWords[state]}${who}.`;
}

const subjectOf = ({ publicId }: SolutionIdentity) => ({ kind: 'solution', publicId });

export interface SolutionMove {
  readonly from: readonly SolutionState[];
  readonly to: SolutionState;
  /** The version that the person saw, if they say so. */
  readonly version?: number | undefined;
  /** Columns that change with the state. */
  readonly set?: SqlValues;
}

/**
 * The one way in which a solution's state changes. Of two at once, one waits for the other's commit and is then refused
 * with the name of who was first. Returns what it was before.
 */
export async function moveSolution(
  tx: Tx,
  solution: SolutionIdentity,
  move: SolutionMove,
): Promise<LockedSolution> {
  const locked = await lockSolution(tx, solution);
  if (!move.from.includes(locked.state))
    throw new Fault('conflict', await standing(tx, solution, locked.state));
  await demandVersion(tx, solution, { seen: move.version, now: locked.version });
  const set = move.set ?? {};
  const columns = Object.keys(set).map((column) => `, ${column} = :${column}`);
  const touched = await execute(
    `UPDATE solutions SET state = :toState, version = version + 1${columns.join('')}
      WHERE id = :solutionId AND state = :fromState AND version = :seenVersion`,
    {
      ...set,
      toState: move.to,
      solutionId: solution.id,
      fromState: locked.state,
      seenVersion: locked.version,
    },
    tx,
  );
  // Cannot happen under the lock; if it does, the lock is broken, and nothing may go on.
  if (touched !== 1) throw new Fault('conflict', await standing(tx, solution, locked.state));
  return locked;
}

/** Refuses a change by somebody who has not seen the present solution. */
async function demandVersion(
  tx: Tx,
  solution: SolutionIdentity,
  { seen, now }: { readonly seen: number | undefined; readonly now: number },
): Promise<void> {
  if (seen === undefined || seen === now) return;
  const who = await lastChangeWords(tx, subjectOf(solution), [...Object.values(actsInto), 'solution.solve']);
  throw new Fault(
    'stale',
    `Solution ${solution.number} was changed${who} since you read it. Look at it again, then repeat yours.`,
    { issues: [{ path: 'version', value: String(now), message: 'is the present version' }] },
  );
}

/** The approved solutions of a night but one: there is one at most. */
export async function approvedBeside(
  tx: Tx,
  nightId: number,
  solutionId: number,
): Promise<readonly SolutionIdentity[]> {
  return select<SolutionIdentity>(
    `SELECT id, public_id AS publicId, number FROM solutions
      WHERE night_id = :nightId AND state = 'approved' AND id <> :solutionId ORDER BY id`,
    { nightId, solutionId },
    tx,
  );
}
