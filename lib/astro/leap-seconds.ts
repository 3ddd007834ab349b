import { requireRange } from './require-range';

/** TAI − UTC from each date on. Nothing was announced after 2017; the last value is carried on until something is.
 * @source IERS Bulletin C, as collected in the IETF/IERS file leap-seconds.list */
const steps: readonly (readonly [utc: number, taiMinusUtc_s: number])[] = [
  [Date.UTC(1972, 0, 1), 10],
  [Date.UTC(1972, 6, 1), 11],
  [Date.UTC(1973, 0, 1), 12],
  [Date.UTC(1974, 0, 1), 13],
  [Date.UTC(1975, 0, 1), 14],
  [Date.UTC(1976, 0, 1), 15],
  [Date.UTC(1977, 0, 1), 16],
  [Date.UTC(1978, 0, 1), 17],
  [Date.UTC(1979, 0, 1), 18],
  [Date.UTC(1980, 0, 1), 19],
  [Date.UTC(1981, 6, 1), 20],
  [Date.UTC(1982, 6, 1), 21],
  [Date.UTC(1983, 6, 1), 22],
  [Date.UTC(1985, 6, 1), 23],
  [Date.UTC(1988, 0, 1), 24],
  [Date.UTC(1990, 0, 1), 25],
  [Date.UTC(1991, 0, 1), 26],
  [Date.UTC(1992, 6, 1), 27],
  [Date.UTC(1993, 6, 1), 28],
  [Date.UTC(1994, 6, 1), 29],
  [Date.UTC(1996, 0, 1), 30],
  [Date.UTC(1997, 6, 1), 31],
  [Date.UTC(1999, 0, 1), 32],
  [Date.UTC(2006, 0, 1), 33],
  [Date.UTC(2009, 0, 1), 34],
  [Date.UTC(2012, 6, 1), 35],
  [Date.UTC(2015, 6, 1), 36],
  [Date.UTC(2017, 0, 1), 37],
];

/** First instant of UTC with whole leap seconds. [ms since 1970] @source IERS, leap-seconds.list */
export const firstLeapSecondUtc = Date.UTC(1972, 0, 1);

/** International Atomic Time minus UTC.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], not before 1972
 * @returns whole seconds [s]
 * @throws {RangeError} before 1972, when UTC ran at another rate and had no whole leap seconds; or not finite
 * @accuracy exact for announced leap seconds; 37 s is carried on after 2017. The inserted second itself cannot be
 *   written in milliseconds since 1970 and counts as the second after it
 * @source IERS Bulletin C, leap-seconds.list */
export function taiMinusUtc_s(utc: number): number {
  requireRange(utc, { name: 'UTC instant', unit: 'ms since 1970', min: -8.64e15, max: 8.64e15 });
  const step = steps.findLast(([from]) => utc >= from);
  if (step === undefined) {
    throw new RangeError(
      `UTC has whole leap seconds only from 1972 on; ${new Date(utc).toISOString()} cannot be put on a uniform scale.`,
    );
  }
  return step[1];
}
