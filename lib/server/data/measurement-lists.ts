import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import type { StarTally } from '@/lib/contracts/set-page';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select } from './database';
import { visibleFrames } from './visible';

interface PageQuery {
  readonly after?: string | undefined;
  readonly limit: number;
}
interface Listed<Row> {
  readonly rows: readonly Row[];
  readonly next: string | null;
}

export interface FaultRow {
  readonly seq: number;
  readonly line: number | null;
  readonly column: string | null;
  readonly value: string | null;
  readonly message: string;
  readonly remedy: string;
}

/** Faults in the order of the file. Only for who may see the whole set. */
export async function listFaultRows(setId: number, page: PageQuery): Promise<Listed<FaultRow>> {
  const after = fromCursor(page.after, ['number'])?.[0] ?? 0;
  const rows = await select<FaultRow>(
    `SELECT seq, line, column_name AS \`column\`, value, message, remedy FROM measurement_faults
      WHERE set_id = :setId AND seq > :after ORDER BY seq LIMIT :limit`,
    { setId, after, limit: page.limit + 1 },
  );
  return pageOf(rows, page.limit, ({ seq }) => [seq]);
}

export interface SetFrameRow {
  readonly id: number;
  readonly number: number;
  readonly band: Band | null;
  readonly nRows: number;
}

/** Frames that a set has rows on, of those in the scope. */
export async function setFrames(scope: Scope, setId: number): Promise<readonly SetFrameRow[]> {
  const frames = visibleFrames(scope);
  return select<SetFrameRow>(
    `SELECT f.id, f.number, f.band, q.n_rows AS nRows
       FROM measurement_set_frames q JOIN frames f ON f.id = q.frame_id
      WHERE q.set_id = :setId AND ${frames.sql} ORDER BY f.number`,
    { setId, ...frames.values },
  );
}

export interface MeasuredStarRow {
  readonly starNo: number;
  readonly name: string;
  readonly ra: number | null;
  readonly decl: number | null;
  readonly nRows: number;
  readonly firstLine: number;
  readonly standard: string | null;
  readonly field: string | null;
  readonly v: number | null;
  readonly bv: number | null;
  readonly matchedBy: 'name' | 'position' | null;
  readonly separation: number | null;
  readonly reason: string;
}

/**
 * Restricts stars to those with rows on frames that the person may see. Costs one pass over the set's rows, so it is
 * asked only of sets that have other rows.
 */
const starsOnFrames = `AND s.star_no IN
  (SELECT r.star_no FROM measurements r WHERE r.set_id = :setId AND r.frame_id IN (:frames))`;

export interface StarList extends PageQuery {
  readonly setId: number;
  readonly matched?: 'yes' | 'no' | undefined;
  readonly reason?: string | undefined;
  /** Frames that the person may see; null for all of the set's. */
  readonly frames: readonly number[] | null;
}

/** Stars of a set: by number, which is the order in which the file names them first. */
export async function listStarRows(list: StarList): Promise<Listed<MeasuredStarRow>> {
  const after = fromCursor(list.after, ['number'])?.[0] ?? 0;
  const conditions = [
    list.matched === undefined ? '' : `AND s.standard_id IS ${list.matched === 'yes' ? 'NOT ' : ''}NULL`,
    list.reason === undefined ? '' : 'AND s.reason = :reason',
    list.frames === null ? '' : starsOnFrames,
  ];
  const rows = await select<MeasuredStarRow>(
    `SELECT s.star_no AS starNo, s.name, s.ra, s.decl, s.n_rows AS nRows, s.first_line AS firstLine,
            d.name AS standard, d.field, d.v, d.bv, s.matched_by AS matchedBy, s.separation, s.reason
       FROM measurement_stars s LEFT JOIN standard_stars d ON d.id = s.standard_id
      WHERE s.set_id = :setId AND s.star_no > :after ${conditions.join(' ')}
      ORDER BY s.star_no LIMIT :limit`,
    {
      setId: list.setId,
      after,
      limit: list.limit + 1,
      reason: list.reason ?? null,
      frames: list.frames === null || list.frames.length === 0 ? [0] : list.frames,
    },
  );
  return pageOf(rows, list.limit, ({ starNo }) => [starNo]);
}

/** How many stars were matched how, and how many were not for which reason. */
export async function tallyStars(
  setId: number,
  frames: readonly number[] | null,
): Promise<readonly StarTally[]> {
  return select<StarTally>(
    `SELECT s.matched_by AS matchedBy, IF(s.standard_id IS NULL, s.reason, '') AS reason, COUNT(*) AS nStars,
            CAST(SUM(s.n_rows) AS INT) AS nRows, COUNT(IF(s.standard_id IS NOT NULL AND s.reason <> '', 1, NULL)) AS nCautions
       FROM measurement_stars s WHERE s.set_id = :setId ${frames === null ? '' : starsOnFrames}
      GROUP BY 1, 2 ORDER BY nStars DESC LIMIT 200`,
    { setId, frames: frames === null || frames.length === 0 ? [0] : frames },
  );
}

export interface MeasurementRowRow {
  readonly rowNo: number;
  readonly frame: number;
  readonly band: Band | null;
  readonly star: string;
  readonly standard: string | null;
  readonly instMag: number;
  readonly instErr: number;
  readonly ra: number | null;
  readonly decl: number | null;
  readonly x: number | null;
  readonly y: number | null;
  readonly fwhm: number | null;
  readonly sky: number | null;
  readonly peak: number | null;
  readonly flag: string | null;
}

/** Rows of a set on frames in the scope, in the order of the file. */
export async function listMeasurementRowRows(
  scope: Scope,
  setId: number,
  page: PageQuery,
): Promise<Listed<MeasurementRowRow>> {
  const frames = visibleFrames(scope);
  const after = fromCursor(page.after, ['number'])?.[0] ?? 0;
  const rows = await select<MeasurementRowRow>(
    `SELECT r.row_no AS rowNo, f.number AS frame, f.band, s.name AS star, d.name AS standard,
            r.inst_mag AS instMag, r.inst_err AS instErr, r.ra, r.decl, r.x, r.y, r.fwhm, r.sky, r.peak, g.text AS flag
       FROM measurements r
       STRAIGHT_JOIN frames f ON f.id = r.frame_id
       STRAIGHT_JOIN measurement_stars s ON s.set_id = r.set_id AND s.star_no = r.star_no
       LEFT JOIN standard_stars d ON d.id = s.standard_id
       LEFT JOIN measurement_flags g ON g.set_id = r.set_id AND g.flag_no = r.flag_no
      WHERE r.set_id = :setId AND r.row_no > :after AND ${frames.sql}
      ORDER BY r.row_no LIMIT :limit`,
    { setId, after, limit: page.limit + 1, ...frames.values },
  );
  return pageOf(rows, page.limit, ({ rowNo }) => [rowNo]);
}
