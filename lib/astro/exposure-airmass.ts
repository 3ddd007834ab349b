import { type AirmassFormula, airmass } from './airmass';
import { horizontalPlace } from './horizontal-place';
import { requireRange } from './require-range';
import type { Site } from './site';
import { skyMoment } from './sky-moment';

/** Mean of three airmasses over an exposure, by Simpson's rule.
 * @param start - airmass at the start [1]
 * @param mid - airmass at mid-exposure [1]
 * @param end - airmass at the end [1]
 * @returns (X_start + 4 X_mid + X_end) / 6 [1]
 * @throws {RangeError} when one is not a finite airmass
 * @accuracy exact for a cubic in time; 1e-5 for an hour's exposure at X < 2
 * @source Simpson's rule */
export function meanAirmass(start: number, mid: number, end: number): number {
  for (const value of [start, mid, end])
    requireRange(value, { name: 'Airmass', unit: '', min: 0.99, max: 40 });
  return (start + 4 * mid + end) / 6;
}

export interface ExposureOnSky {
  readonly site: Site;
  /** J2000 [deg] */
  readonly ra: number;
  /** J2000 [deg] */
  readonly dec: number;
  /** Shutter opens. [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
  /** [s] */
  readonly exposure_s: number;
}

/** Airmass averaged over a long exposure.
 * @param formula - which airmass
 * @param exposure - site, J2000 place [deg], start [ms since 1970] and length [s]
 * @returns airmass [1]
 * @throws {RangeError} when the field is below the horizon at start, middle or end, or an input cannot be
 * @accuracy as meanAirmass
 * @source Simpson's rule on the formula's source */
export function exposureAirmass(formula: AirmassFormula, exposure: ExposureOnSky): number {
  const { site, ra, dec, utcStart } = exposure;
  const length_ms = requireExposure_s(exposure.exposure_s) * 1000;
  const at = (utc: number) => airmass(formula, horizontalPlace(skyMoment(site, utc), ra, dec).zenithDistance);
  return meanAirmass(at(utcStart), at(utcStart + length_ms / 2), at(utcStart + length_ms));
}

/** Lets an exposure time pass, or says what is wrong with it.
 * @param exposure_s - length of the exposure; 0 for a bias [s]
 * @returns the value unchanged [s]
 * @throws {RangeError} negative, longer than a day, or not finite
 * @accuracy exact
 * @source our own limit */
export function requireExposure_s(exposure_s: number): number {
  return requireRange(exposure_s, { name: 'Exposure time', unit: 'seconds', min: 0, max: 86_400 });
}
