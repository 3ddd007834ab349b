/** Guards at the border of the science code: a number that is not finite or not possible stops here. */

export interface RangeRule {
  /** What the number is, as the sentence begins: "Latitude". */
  readonly name: string;
  readonly unit: string;
  readonly min: number;
  readonly max: number;
}

/** Lets a number pass, or says what is wrong with it.
 * @param value - the number to check [unit of the rule]
 * @param rule - its name, unit and closed range
 * @returns the value unchanged [unit of the rule]
 * @throws {RangeError} when it is not finite or lies outside the range
 * @accuracy exact
 * @source definition */
export function requireRange(value: number, rule: RangeRule): number {
  if (!Number.isFinite(value)) throw new RangeError(`${rule.name} must be a finite number, not ${value}.`);
  if (value < rule.min || value > rule.max) {
    throw new RangeError(`${rule.name} must lie from ${rule.min} to ${rule.max} ${rule.unit}, not ${value}.`);
  }
  return value;
}

/** Declinations end at the poles: 95° is not "5° past the pole" but a mistake.
 * @param dec - declination [deg]
 * @returns the value unchanged [deg]
 * @throws {RangeError} when not finite or beyond ±90
 * @accuracy exact
 * @source definition */
export function requireDeclination(dec: number): number {
  return requireRange(dec, { name: 'Declination', unit: 'degrees', min: -90, max: 90 });
}

/** Latitudes end at the poles too.
 * @param latitude - geodetic latitude [deg]
 * @returns the value unchanged [deg]
 * @throws {RangeError} when not finite or beyond ±90
 * @accuracy exact
 * @source definition */
export function requireLatitude(latitude: number): number {
  return requireRange(latitude, { name: 'Latitude', unit: 'degrees', min: -90, max: 90 });
}

/** The years in which the ephemerides and the precession model behind this folder hold their accuracy.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @returns the value unchanged [ms]
 * @throws {RangeError} when not finite or outside 1900 to 2100
 * @accuracy exact
 * @source our own limit */
export function requireInstant(utc: number): number {
  if (!Number.isFinite(utc))
    throw new RangeError(`An instant must be a finite number of milliseconds, not ${utc}.`);
  if (utc < firstInstant || utc >= lastInstant) {
    throw new RangeError(`Sky positions are computed for the years 1900 to 2099, not for ${describe(utc)}.`);
  }
  return utc;
}

const firstInstant = Date.UTC(1900, 0, 1);
const lastInstant = Date.UTC(2100, 0, 1);
/** The widest instant that a date can print. [ms] @source ECMA-262, time values */
const widestDate = 8.64e15;

function describe(utc: number): string {
  return Math.abs(utc) <= widestDate ? new Date(utc).toISOString() : `${utc} ms`;
}
