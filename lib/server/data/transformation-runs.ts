import 'server-only';
import type { SolutionState } from '@/lib/contracts/api/solution';
import type { Slice } from '@/lib/contracts/measurement-check';
import { execute, select, selectOne, type Tx } from './database';
import { loadRows } from './load-rows';

export interface TransformedSolutionRow {
  readonly id: number;
  readonly publicId: string;
  readonly number: number;
  readonly state: SolutionState;
  readonly verdict: string | null;
  /** As it was asked; lib/contracts reads it. */
  readonly model: unknown;
  readonly inputs: unknown;
  readonly softwareVersion: string;
  readonly approvedAt: Date | null;
}

const solutionColumns = `s.id, s.public_id AS publicId, s.number, s.state, s.verdict, s.model, s.inputs,
  s.software_version AS softwareVersion, s.approved_at AS approvedAt`;

/** A solution for which somebody has the right already. */
export function findTransformedSolution(
  publicId: string,
  tx: Tx | null = null,
): Promise<TransformedSolutionRow | null> {
  return selectOne<TransformedSolutionRow>(
    `SELECT ${solutionColumns} FROM solutions s WHERE s.public_id = :publicId`,
    { publicId },
    tx,
  );
}

/** Holds the solution for this transaction, and tells its present state. */
export async function lockSolutionState(tx: Tx, id: number): Promise<SolutionState | null> {
  const row = await selectOne<{ state: SolutionState }>(
    'SELECT state FROM solutions WHERE id = :id FOR UPDATE',
    { id },
    tx,
  );
  return row?.state ?? null;
}

export interface TransformationRow {
  readonly id: number;
  readonly publicId: string;
  readonly solutionId: number;
  readonly programmeId: number | null;
  readonly programme: string | null;
  readonly state: 'queued' | 'done' | 'withdrawn';
  readonly nStars: number | null;
  readonly nMeasurements: number | null;
  readonly nLeftOut: number | null;
}

/** Transformations of a night by a solution, one a programme. */
export function transformationsOf(
  solutionId: number,
  nightId: number,
  tx: Tx | null = null,
): Promise<readonly TransformationRow[]> {
  return select<TransformationRow>(
    `SELECT t.id, t.public_id AS publicId, t.solution_id AS solutionId, t.programme_id AS programmeId, g.code AS programme,
            t.state, t.n_stars AS nStars, t.n_measurements AS nMeasurements, t.n_left_out AS nLeftOut
       FROM transformations t LEFT JOIN programmes g ON g.id = t.programme_id
      WHERE t.solution_id = :solutionId AND t.night_id = :nightId ORDER BY g.code, t.id`,
    { solutionId, nightId },
    tx,
  );
}

/** Nothing will come of what is still queued: its solution is no longer the approved one. */
export function dropTransformations(tx: Tx, solutionId: number, nightId: number): Promise<number> {
  return execute(
    `UPDATE transformations SET state = 'withdrawn', finished_at = NOW(3)
      WHERE solution_id = :solutionId AND night_id = :nightId AND state = 'queued'`,
    { solutionId, nightId },
    tx,
  );
}

export interface Investigator {
  readonly personId: number;
  readonly email: string;
  readonly name: string;
}

/** PI and co-investigators of a programme who can still sign in. */
export function investigatorsOf(tx: Tx, programmeId: number): Promise<readonly Investigator[]> {
  return select<Investigator>(
    `SELECT p.id AS personId, p.email, p.name FROM programme_members m JOIN people p ON p.id = m.person_id
      WHERE m.programme_id = :programmeId AND p.disabled_at IS NULL ORDER BY p.id`,
    { programmeId },
    tx,
  );
}

/** Whether the programme had magnitudes of this night from another solution. */
export async function hasEarlierMagnitudes(tx: Tx, transformationId: number): Promise<boolean> {
  const row = await selectOne(
    `SELECT 1 AS one FROM transformations t JOIN transformations e
         ON e.night_id = t.night_id AND e.programme_id <=> t.programme_id AND e.id <> t.id AND e.state = 'done'
      WHERE t.id = :transformationId LIMIT 1`,
    { transformationId },
    tx,
  );
  return row !== null;
}

export interface TransformationEnd {
  readonly id: number;
  readonly nStars: number;
  readonly nMeasurements: number;
  readonly nLeftOut: number;
  readonly options: object;
}

/** False when it was not queued any more. */
export async function finishTransformation(tx: Tx, end: TransformationEnd): Promise<boolean> {
  const rows = await execute(
    `UPDATE transformations
        SET state = 'done', finished_at = NOW(3), n_stars = :nStars, n_measurements = :nMeasurements,
            n_left_out = :nLeftOut, options = :options
      WHERE id = :id AND state = 'queued'`,
    { ...end, options: JSON.stringify(end.options) },
    tx,
  );
  return rows === 1;
}

/** The instant from which the solution counts its hours in the night; null until it is solved. */
export async function zeroOfHours(solutionId: number, nightId: number): Promise<Date | null> {
  const row = await selectOne<{ utcZero: Date | null }>(
    'SELECT utc_zero AS utcZero FROM solution_nights WHERE solution_id = :solutionId AND night_id = :nightId',
    { solutionId, nightId },
  );
  return row?.utcZero ?? null;
}

/** Columns of a star's magnitudes in the order in which the thread writes them. */
const starColumns = [
  'star_no',
  'star',
  'ra',
  'decl',
  'n_u',
  'n_b',
  'n_v',
  'n_r',
  'n_i',
  ...['v', 'b', 'bv', 'ub', 'vr', 'vi'].flatMap((name) => [name, `${name}_random`, `${name}_systematic`]),
  'bjd_tdb',
  'airmass',
  'flags',
];

/** Loads a file of stars of a transformation. */
export function loadStars(tx: Tx, transformationId: number, slice: Slice): Promise<void> {
  return loadRows(tx, {
    ...slice,
    table: 'calibrated_magnitudes',
    columns: starColumns,
    set: { transformation_id: String(transformationId) },
  });
}
