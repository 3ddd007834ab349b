import { type AirmassFormula, airmass } from './airmass';
import { degPerHour, degPerRad, radPerDeg } from './angles';
import { requireRange } from './require-range';
import type { Site } from './site';
import { skyMoment } from './sky-moment';
import { type Vector3, addScaled, directionOf } from './vector';

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

export interface Exposure {
  /** Shutter opens. [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
  /** [s] */
  readonly exposure_s: number;
}

/** Where the zenith is, and how far aberration tips a star, both on J2000 axes. */
interface Overhead {
  /** Unit vector [1] */
  readonly zenith: Vector3;
  /** [speed of light] */
  readonly velocity_c: Vector3;
}

/** What the airmasses of all stars of one exposure have in common. */
export interface ExposureSky {
  readonly start: Overhead;
  readonly mid: Overhead;
  readonly end: Overhead;
}

/** The sky over one exposure, from which the airmass of any star on it is quick to have.
 * @param site - longitude, latitude [deg], elevation [m]
 * @param exposure - start [ms since 1970] and length [s]
 * @returns zenith and aberration at start, middle and end
 * @throws {RangeError} when the site, the instant or the length cannot be
 * @accuracy as skyMoment
 * @source as skyMoment */
export function exposureSky(site: Site, exposure: Exposure): ExposureSky {
  const { utcStart, exposure_s } = exposure;
  const length_ms = requireExposure_s(exposure_s) * 1000;
  return {
    start: overhead(site, utcStart),
    mid: overhead(site, utcStart + length_ms / 2),
    end: overhead(site, utcStart + length_ms),
  };
}

function overhead(site: Site, utc: number): Overhead {
  const { last_hours, sinLatitude, cosLatitude, toDate, velocity_c } = skyMoment(site, utc);
  const last_rad = last_hours * degPerHour * radPerDeg;
  // From axes of date back to those of J2000: the rows of the rotation, summed by the components.
  const { toX, toY, toZ } = toDate;
  const onEquator = addScaled(addScaled(zero, Math.cos(last_rad), toX), Math.sin(last_rad), toY);
  return { zenith: addScaled(addScaled(zero, cosLatitude, onEquator), sinLatitude, toZ), velocity_c };
}

const zero: Vector3 = { x: 0, y: 0, z: 0 };

/** Airmass of one star averaged over an exposure.
 * @param formula - which airmass
 * @param sky - of the exposure
 * @param direction - unit vector to the star, J2000 axes [1]
 * @returns airmass [1]
 * @throws {RangeError} when the star is below the horizon at start, middle or end, or beyond what the formula holds for
 * @accuracy as meanAirmass; against the altitude of horizontalPlace, rounding
 * @source Simpson's rule on the formula's source */
export function airmassAt(formula: AirmassFormula, sky: ExposureSky, direction: Vector3): number {
  return meanAirmass(
    airmass(formula, zenithDistanceAt(sky.start, direction)),
    airmass(formula, zenithDistanceAt(sky.mid, direction)),
    airmass(formula, zenithDistanceAt(sky.end, direction)),
  );
}

/** The cosine loses digits near the zenith only, where the airmass does not need them. */
function zenithDistanceAt({ zenith, velocity_c }: Overhead, direction: Vector3): number {
  const x = direction.x + velocity_c.x;
  const y = direction.y + velocity_c.y;
  const z = direction.z + velocity_c.z;
  const up = (zenith.x * x + zenith.y * y + zenith.z * z) / Math.sqrt(x * x + y * y + z * z);
  return Math.acos(Math.min(1, up)) * degPerRad;
}

/** Measurements of stars on exposures, shape (n) each; places of the stars, shape (n stars) each. */
export interface StarsOnExposures {
  readonly star: Uint32Array;
  readonly frame: Uint32Array;
  /** J2000 [deg]; NaN without a place. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
}

/** Airmass of every measurement, each star at its own place: over a wide field they differ on one frame.
 * @param formula - which airmass
 * @param skies - one for each frame; null for a frame whose exposure is not known, shape (n frames)
 * @param measurements - which star on which frame, and where the stars are [deg]
 * @returns airmass [1], shape (n); NaN without place or sky, below the horizon, or beyond what the formula holds for
 * @throws {RangeError} when the columns differ in length
 * @accuracy as airmassAt
 * @source as airmassAt */
export function measuredAirmasses(
  formula: AirmassFormula,
  skies: readonly (ExposureSky | null)[],
  measurements: StarsOnExposures,
): Float64Array {
  const { star, frame, ra, dec } = measurements;
  if (star.length !== frame.length || ra.length !== dec.length)
    throw new RangeError('Stars and frames, right ascensions and declinations come in pairs.');
  const directions = Array.from(ra, (ra_deg, s) => directionOf(ra_deg, dec[s] ?? NaN));
  const airmasses = new Float64Array(star.length).fill(NaN);
  for (let m = 0; m < star.length; m += 1) {
    const sky = skies[frame[m] ?? 0];
    const direction = directions[star[m] ?? 0];
    if (!sky || !direction || Number.isNaN(direction.x)) continue;
    try {
      airmasses[m] = airmassAt(formula, sky, direction);
    } catch (error) {
      // A star at the edge of a field that sets: the others on the frame have theirs.
      if (!(error instanceof RangeError)) throw error;
    }
  }
  return airmasses;
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
