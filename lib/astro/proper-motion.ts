import { degPerRad, normaliseRightAscension, radPerDeg } from './angles';
import type { EquatorialPlace } from './vector';

const masPerDeg = 3_600_000;
/** J2000.0 as if it were UTC [ms since 1970]: a minute of difference moves no star. */
const j2000_ms = Date.UTC(2000, 0, 1, 12);
const julianYear_ms = 365.25 * 86_400_000;

export interface ProperMotion {
  /** Times cos dec [mas/yr] */
  readonly pmRa: number;
  /** [mas/yr] */
  readonly pmDec: number;
}

/** Where a star stands some years after the epoch of its place, in the same coordinates.
 * @param place - ra and dec [deg]
 * @param motion - proper motion; NaN where none is known [mas/yr]
 * @param years - since the epoch of the place [Julian yr]
 * @returns ra and dec; the place itself where no motion is known [deg]
 * @throws nothing
 * @accuracy a straight line in the tangent plane: below 0.001 arcsec over 50 years at 10 arcsec/yr
 * @source definition of proper motion */
export function placeAfter(place: EquatorialPlace, motion: ProperMotion, years: number): EquatorialPlace {
  const { ra, dec } = place;
  if (Number.isNaN(motion.pmRa) || Number.isNaN(motion.pmDec)) return { ra, dec };
  const xi_rad = ((motion.pmRa * years) / masPerDeg) * radPerDeg;
  const eta_rad = ((motion.pmDec * years) / masPerDeg) * radPerDeg;
  // In the tangent plane at the place, so that a star near a pole moves rightly too.
  const [sin, cos] = [Math.sin(dec * radPerDeg), Math.cos(dec * radPerDeg)];
  const below = cos - eta_rad * sin;
  return {
    ra: normaliseRightAscension(ra + Math.atan2(xi_rad, below) * degPerRad),
    dec: Math.atan2(sin + eta_rad * cos, Math.hypot(xi_rad, below)) * degPerRad,
  };
}

/** An instant as years since J2000.0, for proper motions.
 * @param utc_ms - since 1970 UTC [ms]
 * @returns years since 2000.0 [Julian yr]
 * @throws nothing
 * @accuracy about a minute: UTC is taken for TT
 * @source definition of the Julian year */
export function yearsSinceJ2000(utc_ms: number): number {
  return (utc_ms - j2000_ms) / julianYear_ms;
}
