import 'server-only';
import type { Band, FrameType } from '@/lib/contracts/bands';
import { select, selectOne } from './database';
import { rowArrays, type RowArray } from './row-arrays';

/** A set of targets holds targets only; in a mixed set they are what is not on a frame of standards. */
export const isTargetRow = `m.state IN ('matched', 'in use') AND (m.kind = 'target' OR (m.kind = 'mixed' AND f.type <> 'standard'))`;

export interface TargetFrameRow {
  readonly id: number;
  readonly number: number;
  readonly programmeId: number | null;
  readonly type: FrameType;
  readonly band: Band | null;
  readonly ra: number | null;
  readonly decl: number | null;
  readonly utcStart: Date;
  readonly exposure: number;
  readonly utcMid: Date;
}

/** Frames of the night on which sets of targets have measurements. */
export function targetFrames(nightId: number): Promise<readonly TargetFrameRow[]> {
  return select<TargetFrameRow>(
    `SELECT f.id, f.number, f.programme_id AS programmeId, f.type, f.band, f.ra, f.decl, f.utc_start AS utcStart, f.exposure,
            f.utc_mid AS utcMid
       FROM frames f
      WHERE f.night_id = :nightId
        AND EXISTS (SELECT 1 FROM measurement_set_frames q JOIN measurement_sets m ON m.id = q.set_id
                     WHERE q.frame_id = f.id AND ${isTargetRow})
      ORDER BY f.utc_mid, f.id`,
    { nightId },
  );
}

export interface TargetSetRow {
  readonly id: number;
  readonly isMixed: number;
  readonly nRows: number;
  readonly lastStar: number;
}

/** Sets of the night with measurements of targets, the oldest first. */
export function targetSets(nightId: number): Promise<readonly TargetSetRow[]> {
  return select<TargetSetRow>(
    `SELECT m.id, m.n_rows AS nRows, m.kind = 'mixed' AS isMixed,
            (SELECT COALESCE(MAX(s.star_no), 0) FROM measurement_stars s WHERE s.set_id = m.id) AS lastStar
       FROM measurement_sets m
      WHERE m.night_id = :nightId
        AND EXISTS (SELECT 1 FROM measurement_set_frames q JOIN frames f ON f.id = q.frame_id
                     WHERE q.set_id = m.id AND ${isTargetRow})
      ORDER BY m.id`,
    { nightId },
  );
}

/** How many measurements these sets have on each frame, and from how many of the sets. */
export function measuredFrames(
  setIds: readonly number[],
): Promise<readonly { readonly frameId: number; readonly nRows: number; readonly nSets: number }[]> {
  if (setIds.length === 0) return Promise.resolve([]);
  return select(
    `SELECT frame_id AS frameId, CAST(SUM(n_rows) AS INT) AS nRows, CAST(COUNT(*) AS INT) AS nSets
       FROM measurement_set_frames WHERE set_id IN (:setIds) GROUP BY frame_id`,
    { setIds },
  );
}

export async function flagTexts(
  setId: number,
): Promise<readonly { readonly flagNo: number; readonly text: string }[]> {
  return select('SELECT flag_no AS flagNo, text FROM measurement_flags WHERE set_id = :setId', { setId });
}

/** Rows that one statement reads: few enough to die young, enough to forget what a statement costs. */
const chunk = 10_000;

/** star_no, name, ra, decl of a set's stars, in chunks. */
export const starChunks = (setId: number): AsyncGenerator<readonly RowArray[]> =>
  chunks(
    `SELECT star_no, name, ra, decl FROM measurement_stars
      WHERE set_id = ? AND star_no > ? ORDER BY star_no LIMIT ${chunk}`,
    setId,
  );

/** row_no, frame_id, star_no, inst_mag, inst_err, ra, decl, peak, flag_no of a set's rows, in chunks. */
export const measurementChunks = (setId: number): AsyncGenerator<readonly RowArray[]> =>
  chunks(
    `SELECT row_no, frame_id, star_no, inst_mag, inst_err, ra, decl, peak, flag_no FROM measurements
      WHERE set_id = ? AND row_no > ? ORDER BY row_no LIMIT ${chunk}`,
    setId,
  );

async function* chunks(sql: string, setId: number): AsyncGenerator<readonly RowArray[]> {
  let after = 0;
  for (;;) {
    const rows = await rowArrays(sql, [setId, after]);
    if (rows.length > 0) yield rows;
    if (rows.length < chunk) return;
    after = Number(rows.at(-1)?.[0]);
  }
}

/** The smallest saturation of the telescope's cameras [counts]; null where none is known. */
export async function saturationOf(telescopeId: number): Promise<number | null> {
  const row = await selectOne<{ saturation: number | null }>(
    'SELECT MIN(saturation) AS saturation FROM cameras WHERE telescope_id = :telescopeId',
    { telescopeId },
  );
  return row?.saturation ?? null;
}
