/** Julian dates of instants that are kept as milliseconds since 1970 (UTC, leap seconds not counted). */

/** Julian date of 1970-01-01T00:00:00. [d] @source definition */
export const unixEpochJd = 2440587.5;
/** Julian date minus modified Julian date. [d] @source IAU 1973 definition */
export const jdMinusMjd = 2400000.5;
/** Milliseconds in a day. [ms/d] @source definition */
export const msPerDay = 86_400_000;
/** Seconds in a day. [s/d] @source definition */
export const sPerDay = 86_400;

/** Julian date on the UTC scale.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @returns JD(UTC) [d]
 * @throws {RangeError} when not finite
 * @accuracy 40 µs, the spacing of doubles at JD 2.4 million
 * @source definition */
export function jdUtc(utc: number): number {
  if (!Number.isFinite(utc))
    throw new RangeError(`An instant must be a finite number of milliseconds, not ${utc}.`);
  return unixEpochJd + utc / msPerDay;
}

/** Modified Julian date on the UTC scale.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @returns MJD(UTC) = JD − 2400000.5 [d]
 * @throws {RangeError} when not finite
 * @accuracy 1 µs, the spacing of doubles at MJD 60,000
 * @source IAU 1973 definition */
export function mjdUtc(utc: number): number {
  if (!Number.isFinite(utc))
    throw new RangeError(`An instant must be a finite number of milliseconds, not ${utc}.`);
  return unixEpochJd - jdMinusMjd + utc / msPerDay;
}

/** Instant of a Julian date on the UTC scale.
 * @param jd - JD(UTC) [d]
 * @returns instant, to the whole millisecond [ms since 1970-01-01T00:00:00Z]
 * @throws {RangeError} when not finite
 * @accuracy 1 ms
 * @source definition */
export function utcFromJd(jd: number): number {
  if (!Number.isFinite(jd)) throw new RangeError(`A Julian date must be a finite number of days, not ${jd}.`);
  return Math.round((jd - unixEpochJd) * msPerDay);
}

/** Instant of a modified Julian date on the UTC scale.
 * @param mjd - MJD(UTC) [d]
 * @returns instant, to the whole millisecond [ms since 1970-01-01T00:00:00Z]
 * @throws {RangeError} when not finite
 * @accuracy 1 ms
 * @source IAU 1973 definition */
export function utcFromMjd(mjd: number): number {
  if (!Number.isFinite(mjd))
    throw new RangeError(`A modified Julian date must be a finite number of days, not ${mjd}.`);
  return Math.round((mjd + jdMinusMjd - unixEpochJd) * msPerDay);
}
