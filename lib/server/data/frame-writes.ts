import 'server-only';
import { database } from '@/db/connection';
import type { FrameOrigin } from '@/lib/contracts/api/frame';
import type { Band, FrameType } from '@/lib/contracts/bands';
import { execute, select, selectOne, type SqlValues, type Tx } from './database';
import type { Place } from './complete-frames';
import { newPublicId } from './public-id';

/** A frame's columns as they are written; its geometry has been derived. */
export interface FrameValues {
  readonly number: number;
  readonly type: FrameType;
  readonly file: string | null;
  readonly object: string;
  readonly field: string | null;
  readonly programmeId: number | null;
  readonly ra: number | null;
  readonly decl: number | null;
  readonly band: Band | null;
  readonly utcStart: Date;
  readonly exposure: number;
  readonly utcMid: Date;
  readonly airmass: number | null;
  readonly altitude: number | null;
  readonly hourAngle: number | null;
  readonly moonSeparation: number | null;
  readonly sunAltitude: number;
  readonly fwhm: number | null;
  readonly sky: number | null;
  readonly comment: string;
}

const columnsOf = (frame: FrameValues): Record<string, string | number | Date | null> => ({
  number: frame.number,
  type: frame.type,
  file: frame.file,
  object: frame.object,
  field: frame.field,
  programme_id: frame.programmeId,
  ra: frame.ra,
  decl: frame.decl,
  band: frame.band,
  utc_start: frame.utcStart,
  exposure: frame.exposure,
  utc_mid: frame.utcMid,
  airmass: frame.airmass,
  altitude: frame.altitude,
  hour_angle: frame.hourAngle,
  moon_separation: frame.moonSeparation,
  sun_altitude: frame.sunAltitude,
  fwhm: frame.fwhm,
  sky: frame.sky,
  comment: frame.comment,
});

/** Rows in one INSERT: some 400 bytes each, far below the server's packet limit. */
const rowsPerInsert = 1000;

interface Logging {
  readonly nightId: number;
  readonly origin: FrameOrigin;
  readonly loggedById: number;
}

/** Writes frames whose numbers and files are known to be free; the caller holds the night. */
export async function insertFrames(tx: Tx, logging: Logging, frames: readonly FrameValues[]): Promise<void> {
  const rows = frames.map((frame) => ({
    public_id: newPublicId(),
    night_id: logging.nightId,
    origin: logging.origin,
    logged_by_id: logging.loggedById,
    ...columnsOf(frame),
  }));
  for (let first = 0; first < rows.length; first += rowsPerInsert) {
    await database()
      .getQueryInterface()
      .bulkInsert('frames', rows.slice(first, first + rowsPerInsert), { transaction: tx });
  }
}

/** Writes a corrected frame if it still has the version that was seen; returns whether it had. */
export async function updateFrame(
  tx: Tx,
  frame: { readonly id: number; readonly version: number },
  values: FrameValues,
): Promise<boolean> {
  const columns = columnsOf(values);
  const set = Object.keys(columns).map((column) => `${column} = :${column}`);
  const touched = await execute(
    `UPDATE frames SET ${set.join(', ')}, version = version + 1 WHERE id = :frameId AND version = :seenVersion`,
    { ...columns, frameId: frame.id, seenVersion: frame.version },
    tx,
  );
  return touched === 1;
}

export async function deleteFrame(tx: Tx, frameId: number): Promise<void> {
  await execute('DELETE FROM frames WHERE id = :frameId', { frameId }, tx);
}

/** The highest number in the night; 0 when it has no frame. */
export async function highestFrameNumber(tx: Tx | null, nightId: number): Promise<number> {
  const row = await selectOne<{ highest: number | null }>(
    'SELECT MAX(number) AS highest FROM frames WHERE night_id = :nightId',
    { nightId },
    tx,
  );
  return row?.highest ?? 0;
}

interface Taken {
  readonly id: number;
  readonly number: number;
  readonly file: string | null;
}

/** Frames of the night that have one of the numbers or of the file names. */
export async function framesInTheWay(
  tx: Tx,
  nightId: number,
  wanted: { readonly numbers: readonly number[]; readonly files: readonly string[] },
): Promise<readonly Taken[]> {
  const values: SqlValues = {
    nightId,
    numbers: wanted.numbers.length === 0 ? [0] : wanted.numbers,
    // No file has an empty name.
    files: wanted.files.length === 0 ? [''] : wanted.files,
  };
  // Two statements, each on its own index.
  return select<Taken>(
    `SELECT id, number, file FROM frames WHERE night_id = :nightId AND number IN (:numbers)
      UNION SELECT id, number, file FROM frames WHERE night_id = :nightId AND file IN (:files)`,
    values,
    tx,
  );
}

/** Name of a measurement set with measurements on the frame, or null. */
export async function setThatUses(tx: Tx, frameId: number): Promise<string | null> {
  const set = await selectOne<{ name: string }>(
    `SELECT s.name FROM measurement_set_frames u JOIN measurement_sets s ON s.id = u.set_id
      WHERE u.frame_id = :frameId ORDER BY s.id LIMIT 1`,
    { frameId },
    tx,
  );
  return set?.name ?? null;
}

interface ToldFrame {
  readonly type: FrameType;
  readonly file?: string | null | undefined;
  readonly band?: Band | null | undefined;
  readonly utc_start: string;
  readonly exposure: number;
  readonly fwhm?: number | null | undefined;
  readonly sky?: number | null | undefined;
  readonly comment: string;
}
interface Geometry {
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcMid: number;
  readonly airmass: number | null;
  readonly altitude: number | null;
  readonly hourAngle: number | null;
  readonly moonSeparation: number | null;
  readonly sunAltitude: number;
}

/** A frame's columns from what was told, what was looked up and what was derived. */
export const toFrameValues = (
  told: ToldFrame,
  place: Place,
  { utcMid, ...geometry }: Geometry,
  number: number,
): FrameValues => ({
  number,
  type: told.type,
  file: told.file ?? null,
  ...place,
  band: told.band ?? null,
  utcStart: new Date(told.utc_start),
  exposure: told.exposure,
  utcMid: new Date(utcMid),
  ...geometry,
  fwhm: told.fwhm ?? null,
  sky: told.sky ?? null,
  comment: told.comment,
});
