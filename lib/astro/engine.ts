/**
 * The one door to astronomy-engine. Its own TT − UT is an extrapolation made in 2005, five seconds off in 2026; it
 * is replaced here, before anything is computed, by the announced leap seconds.
 */
import { AstroTime, DeltaT_EspenakMeeus, SetDeltaTFunction } from 'astronomy-engine';
import { msPerDay } from './julian-date';
import { firstLeapSecondUtc } from './leap-seconds';
import { requireInstant } from './require-range';
import { ttMinusUtc_s } from './time-scales';

/** 2000-01-01T12:00:00Z, from which the engine counts days. [ms since 1970] @source astronomy-engine 2.1.19 */
const engineEpochUtc = Date.UTC(2000, 0, 1, 12);

SetDeltaTFunction((ut_days) => {
  const utc = engineEpochUtc + ut_days * msPerDay;
  return utc < firstLeapSecondUtc ? DeltaT_EspenakMeeus(ut_days) : ttMinusUtc_s(utc);
});

/** An instant in the engine's own form.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], UT1 taken as UTC
 * @returns the engine's time, with Terrestrial Time from the leap seconds
 * @throws {RangeError} not finite, or outside 1900 to 2099
 * @accuracy |UT1 − UTC| < 0.9 s, 0.004° of rotation
 * @source IERS, definition of UTC */
export function engineTime(utc: number): AstroTime {
  return new AstroTime((requireInstant(utc) - engineEpochUtc) / msPerDay);
}
