import 'server-only';
import {
  skyTypes,
  type Frame,
  type FrameCaution,
  type FrameOrigin,
  type FrameQuery,
} from '@/lib/contracts/api/frame';
import { starKey } from '@/lib/contracts/star-name';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select, selectOne, type SqlValues, type Tx } from './database';
import type { FrameValues } from './frame-writes';
import { visibleFrames } from './visible';

export interface FrameRow extends FrameValues {
  readonly id: number;
  readonly publicId: string;
  readonly programme: string | null;
  readonly origin: FrameOrigin;
  readonly version: number;
  readonly loggedBy: string;
  /** Lowest pointing of the telescope. [deg] */
  readonly minAltitude: number;
}

const selection = `SELECT f.id, f.public_id AS publicId, f.number, f.type, f.file, f.object, f.field,
    f.programme_id AS programmeId, g.code AS programme, f.ra, f.decl, f.band, f.utc_start AS utcStart, f.exposure,
    f.utc_mid AS utcMid, f.airmass, f.altitude, f.hour_angle AS hourAngle, f.moon_separation AS moonSeparation,
    f.sun_altitude AS sunAltitude, f.fwhm, f.sky, f.comment, f.origin, f.version, p.name AS loggedBy,
    t.min_altitude AS minAltitude
  FROM frames f
  JOIN nights n ON n.id = f.night_id
  JOIN telescopes t ON t.id = n.telescope_id
  JOIN people p ON p.id = f.logged_by_id
  LEFT JOIN programmes g ON g.id = f.programme_id`;

export interface FramePage {
  readonly rows: readonly FrameRow[];
  readonly next: string | null;
}

/** Frames of a night in the scope, by number. */
export async function listFrameRows(scope: Scope, nightId: number, query: FrameQuery): Promise<FramePage> {
  const visible = visibleFrames(scope);
  const after = fromCursor(query.after, ['number']);
  const conditions = [
    'f.night_id = :nightId',
    visible.sql,
    after === null ? '' : 'f.number > :after',
    query.type === undefined ? '' : 'f.type = :type',
    query.band === undefined ? '' : 'f.band = :band',
    query.object === undefined ? '' : "REGEXP_REPLACE(f.object, '[[:space:]-]', '') = :object",
    query.from === undefined ? '' : 'f.utc_mid >= :from',
    query.to === undefined ? '' : 'f.utc_mid < :to',
  ].filter((sql) => sql !== '');
  const values: SqlValues = {
    ...visible.values,
    nightId,
    after: after?.[0] ?? null,
    type: query.type ?? null,
    band: query.band ?? null,
    object: query.object === undefined ? null : starKey(query.object),
    from: query.from === undefined ? null : new Date(query.from),
    to: query.to === undefined ? null : new Date(query.to),
    limit: query.limit + 1,
  };
  const rows = await select<FrameRow>(
    `${selection} WHERE ${conditions.join(' AND ')} ORDER BY f.number LIMIT :limit`,
    values,
  );
  return pageOf(rows, query.limit, ({ number }) => [number]);
}

/** Every frame of a night in the scope, by time: a night's page shows them all. */
export async function allFrameRows(scope: Scope, nightId: number): Promise<readonly FrameRow[]> {
  const visible = visibleFrames(scope);
  return select<FrameRow>(
    `${selection} WHERE f.night_id = :nightId AND ${visible.sql} ORDER BY f.utc_mid, f.number`,
    {
      nightId,
      ...visible.values,
    },
  );
}

/** A frame of the night by its public id, if the scope holds it. */
export async function findFrame(
  scope: Scope,
  nightId: number,
  publicId: string,
  tx: Tx | null = null,
): Promise<FrameRow | null> {
  const visible = visibleFrames(scope);
  return selectOne<FrameRow>(
    `${selection} WHERE f.night_id = :nightId AND f.public_id = :publicId AND ${visible.sql}`,
    { nightId, publicId, ...visible.values },
    tx,
  );
}

/** Frames of the night by their numbers, in the order of the numbers. */
export async function framesByNumber(
  tx: Tx,
  nightId: number,
  numbers: readonly number[],
): Promise<readonly FrameRow[]> {
  return select<FrameRow>(
    `${selection} WHERE f.night_id = :nightId AND f.number IN (:numbers) ORDER BY f.number`,
    { nightId, numbers },
    tx,
  );
}

/** The latest frames of the night, the highest number first. */
export async function latestFrames(
  scope: Scope,
  nightId: number,
  count: number,
): Promise<readonly FrameRow[]> {
  const visible = visibleFrames(scope);
  return select<FrameRow>(
    `${selection} WHERE f.night_id = :nightId AND ${visible.sql} ORDER BY f.number DESC LIMIT :count`,
    { nightId, count, ...visible.values },
  );
}

/** What of a frame deserves a second look. */
function cautionsOf(row: FrameRow): FrameCaution[] {
  if (!skyTypes.has(row.type)) return [];
  const found: FrameCaution[] = [];
  if (row.altitude === null) {
    // A focus or test frame need not say where it looked.
    if (row.type === 'standard' || row.type === 'target') found.push('no-coordinates');
  } else if (row.altitude < 0) found.push('below-horizon');
  else if (row.altitude < row.minAltitude) found.push('below-pointing-limit');
  if ((row.type === 'standard' || row.type === 'target') && row.sunAltitude > 0) found.push('sun-up');
  return found;
}

/** A frame as the interface gives it. */
export const toFrame = (row: FrameRow): Frame => ({
  id: row.publicId,
  number: row.number,
  type: row.type,
  file: row.file,
  object: row.object,
  field: row.field,
  programme: row.programme,
  ra: row.ra,
  dec: row.decl,
  band: row.band,
  utc_start: row.utcStart.toISOString(),
  exposure: row.exposure,
  utc_mid: row.utcMid.toISOString(),
  airmass: row.airmass,
  altitude: row.altitude,
  hour_angle: row.hourAngle,
  moon_separation: row.moonSeparation,
  sun_altitude: row.sunAltitude,
  fwhm: row.fwhm,
  sky: row.sky,
  comment: row.comment,
  origin: row.origin,
  logged_by: row.loggedBy,
  cautions: cautionsOf(row),
  version: row.version,
});
