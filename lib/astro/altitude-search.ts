/** When does a body cross an altitude? By sampling, refining the turning points, and closing in between them. */

export interface TimeWindow {
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly start: number;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly end: number;
}

/** A height at an instant. */
export interface AltitudePoint {
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utc: number;
  /** [deg] */
  readonly altitude: number;
}

/** Part of a window; an end is either a crossing of the limit or the edge of the window. */
export interface Interval {
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly start: number;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly end: number;
  readonly startsAt: 'crossing' | 'window edge';
  readonly endsAt: 'crossing' | 'window edge';
}

export type AltitudeAt = (utc: number) => number;

/** Samples closer than this show every turning point of Sun and Moon. [ms] @source our own choice */
const sampleStep_ms = 20 * 60_000;
/** Turning points are closed in to this. [ms] @source our own choice */
const turningTolerance_ms = 500;
/** Crossings are closed in to this. [ms] @source our own choice */
const crossingTolerance_ms = 10;

/** Edges and turning points of an altitude within a window: between two of them it only rises or only falls.
 * @param altitudeAt - smooth altitude of a body [deg] at an instant [ms since 1970]
 * @param window - not empty [ms since 1970]
 * @returns points in order of time; the first and the last are the window's edges
 * @throws {RangeError} an empty, endless or more than 40 days long window
 * @accuracy turning points to 1 s; one that lies less than 20 min from an edge may be missed
 * @source golden-section search: Kiefer 1953, Proc. Amer. Math. Soc. 4, 502 */
export function turningPoints(altitudeAt: AltitudeAt, window: TimeWindow): readonly AltitudePoint[] {
  const samples = sampleAltitude(altitudeAt, requireWindow(window));
  const points = samples.slice(0, 1);
  for (let i = 1; i + 1 < samples.length; i += 1) {
    const [before, here, after] = samples.slice(i - 1, i + 2);
    if (before === undefined || here === undefined || after === undefined) continue;
    const isHighest = here.altitude > before.altitude && here.altitude >= after.altitude;
    const isLowest = here.altitude < before.altitude && here.altitude <= after.altitude;
    if (!isHighest && !isLowest) continue;
    points.push(closeInOnTurn(altitudeAt, { start: before.utc, end: after.utc }, isHighest ? 1 : -1));
  }
  return [...points, ...samples.slice(-1)];
}

/** Parts of a window in which an altitude lies below a limit.
 * @param altitudeAt - smooth altitude of a body [deg] at an instant [ms since 1970]
 * @param points - from turningPoints, of the same altitude
 * @param limit - [deg]
 * @returns intervals in order of time; none when the altitude never goes below the limit
 * @throws nothing
 * @accuracy 0.1 s
 * @source Illinois variant of regula falsi: Dowell & Jarratt 1971, BIT 11, 168 */
export function intervalsBelow(
  altitudeAt: AltitudeAt,
  points: readonly AltitudePoint[],
  limit: number,
): readonly Interval[] {
  const intervals: Interval[] = [];
  let open: { start: number; startsAt: Interval['startsAt'] } | undefined;
  const [first] = points;
  if (first !== undefined && first.altitude < limit) open = { start: first.utc, startsAt: 'window edge' };
  for (const [i, after] of points.entries()) {
    const before = points[i - 1];
    if (before === undefined || before.altitude < limit === after.altitude < limit) continue;
    const utc = closeInOnCrossing(altitudeAt, [before, after], limit);
    if (open === undefined) open = { start: utc, startsAt: 'crossing' };
    else {
      intervals.push({ ...open, end: utc, endsAt: 'crossing' });
      open = undefined;
    }
  }
  const last = points.at(-1);
  if (open !== undefined && last !== undefined)
    intervals.push({ ...open, end: last.utc, endsAt: 'window edge' });
  return intervals;
}

function requireWindow(window: TimeWindow): TimeWindow {
  const length_ms = window.end - window.start;
  if (!(length_ms > 0 && length_ms <= 40 * 86_400_000)) {
    throw new RangeError(
      `A window of time must end after it starts, within 40 days: ${window.start} to ${window.end}.`,
    );
  }
  return window;
}

function sampleAltitude(altitudeAt: AltitudeAt, { start, end }: TimeWindow): readonly AltitudePoint[] {
  const count = Math.max(2, Math.ceil((end - start) / sampleStep_ms));
  return Array.from({ length: count + 1 }, (_, i) => {
    const utc = start + ((end - start) * i) / count;
    return { utc, altitude: altitudeAt(utc) };
  });
}

/** Golden-section search for the highest (sign 1) or lowest (sign −1) point between two instants. */
function closeInOnTurn(altitudeAt: AltitudeAt, window: TimeWindow, sign: 1 | -1): AltitudePoint {
  const golden = (Math.sqrt(5) - 1) / 2;
  let { start, end } = window;
  const point = (utc: number): AltitudePoint => ({ utc, altitude: altitudeAt(utc) });
  let left = point(end - golden * (end - start));
  let right = point(start + golden * (end - start));
  while (end - start > turningTolerance_ms) {
    if (sign * left.altitude > sign * right.altitude) {
      [end, right] = [right.utc, left];
      left = point(end - golden * (end - start));
    } else {
      [start, left] = [left.utc, right];
      right = point(start + golden * (end - start));
    }
  }
  return sign * left.altitude > sign * right.altitude ? left : right;
}

/** Regula falsi that halves the weight of an end that stays (Illinois), on a stretch that crosses the limit once. */
function closeInOnCrossing(
  altitudeAt: AltitudeAt,
  [before, after]: readonly [AltitudePoint, AltitudePoint],
  limit: number,
): number {
  let [t0, f0] = [before.utc, before.altitude - limit];
  let [t1, f1] = [after.utc, after.altitude - limit];
  for (let i = 0; i < 100 && Math.abs(t1 - t0) > crossingTolerance_ms && f1 !== 0; i += 1) {
    const t = t1 - (f1 * (t1 - t0)) / (f1 - f0);
    const f = altitudeAt(t) - limit;
    if (f > 0 !== f1 > 0) [t0, f0] = [t1, f1];
    else f0 /= 2;
    if (Math.abs(t - t1) < crossingTolerance_ms / 10) return Math.round(t);
    [t1, f1] = [t, f];
  }
  return Math.round(t1);
}
