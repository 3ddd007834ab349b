import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select, type Tx } from './database';
import { visibleFrames, visibleNights } from './visible';

export interface ObservationRow {
  readonly seq: number;
  readonly set: string;
  readonly rowNo: number;
  readonly nightDate: string;
  readonly frame: number;
  readonly star: string;
  readonly band: Band;
  readonly utcMid: Date;
  readonly airmass: number;
  readonly colour: number | null;
  readonly magnitude: number | null;
  readonly instMag: number;
  readonly instErr: number;
  readonly residual: number | null;
  readonly standardised: number | null;
  readonly weight: number | null;
  readonly leverage: number | null;
  readonly influence: number | null;
  readonly isUsed: number;
  readonly reason: string;
  readonly decidedBy: string | null;
}

/**
 * Observations of a solution on frames in the scope, in the order in which the fit had them, that of time. A joint
 * solution shows each reader only what is on nights and frames of theirs.
 */
export async function listObservationRows(
  scope: Scope,
  solutionId: number,
  query: {
    readonly after?: string | undefined;
    readonly limit: number;
    readonly band?: Band | undefined;
  },
): Promise<{ readonly rows: readonly ObservationRow[]; readonly next: string | null }> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  const after = fromCursor(query.after, ['number'])?.[0] ?? -1;
  const rows = await select<ObservationRow>(
    `SELECT o.seq, m.public_id AS \`set\`, o.row_no AS rowNo, DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate,
            f.number AS frame, d.name AS star, o.band, f.utc_mid AS utcMid, o.airmass, o.colour, o.magnitude,
            o.inst_mag AS instMag, o.inst_err AS instErr, o.residual, o.standardised, o.weight, o.leverage,
            o.influence, o.is_used AS isUsed, o.reason, p.name AS decidedBy
       FROM solution_observations o
       JOIN measurement_sets m ON m.id = o.set_id
       JOIN frames f ON f.id = o.frame_id
       JOIN nights n ON n.id = f.night_id
       JOIN standard_stars d ON d.id = o.standard_id
       LEFT JOIN people p ON p.id = o.decided_by_id
      WHERE o.solution_id = :solutionId AND o.seq > :after AND ${nights.sql} AND ${frames.sql}
        ${query.band === undefined ? '' : 'AND o.band = :band'}
      ORDER BY o.seq LIMIT :limit`,
    {
      solutionId,
      after,
      band: query.band ?? null,
      limit: query.limit + 1,
      ...nights.values,
      ...frames.values,
    },
  );
  return pageOf(rows, query.limit, ({ seq }) => [seq]);
}

/** Those of the observations, written SET.ROW, that the solution was given. */
export async function observationsOf(
  tx: Tx,
  solutionId: number,
  observations: readonly string[],
): Promise<ReadonlyMap<string, { readonly setId: number; readonly rowNo: number }>> {
  const rows = await select<{ setId: number; rowNo: number; observation: string }>(
    `SELECT o.set_id AS setId, o.row_no AS rowNo, CONCAT(m.public_id, '.', o.row_no) AS observation
       FROM solution_observations o JOIN measurement_sets m ON m.id = o.set_id
      WHERE o.solution_id = :solutionId AND CONCAT(m.public_id, '.', o.row_no) IN (:observations)`,
    { solutionId, observations },
    tx,
  );
  return new Map(rows.map(({ observation, ...row }) => [observation, row]));
}
