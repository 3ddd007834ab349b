import { degPerRad, normaliseRightAscension, radPerDeg } from './angles';
import { requireDeclination } from './require-range';
import type { EquatorialPlace } from './vector';

/** Angle between two places on the sphere.
 * @param from - ra and dec [deg]
 * @param to - ra and dec, same equinox [deg]
 * @returns 0 to 180 [deg]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy rounding everywhere: tiny angles, poles, across RA 0, opposite places
 * @source Vincenty 1975, Survey Review 23, 88, for a sphere */
export function separation(from: EquatorialPlace, to: EquatorialPlace): number {
  const { dRa_rad, sin1, cos1, sin2, cos2 } = anglesOf(from, to);
  const [sinRa, cosRa] = [Math.sin(dRa_rad), Math.cos(dRa_rad)];
  const across = Math.hypot(cos2 * sinRa, cos1 * sin2 - sin1 * cos2 * cosRa);
  return Math.atan2(across, sin1 * sin2 + cos1 * cos2 * cosRa) * degPerRad;
}

/** Direction from one place to another, counted from north through east.
 * @param from - ra and dec [deg]
 * @param to - ra and dec, same equinox [deg]
 * @returns 0 ≤ angle < 360; 0 when the places coincide [deg]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy rounding; at a pole north has no direction and the meridian of `from` stands for it
 * @source spherical trigonometry */
export function positionAngle(from: EquatorialPlace, to: EquatorialPlace): number {
  const { dRa_rad, sin1, cos1, sin2, cos2 } = anglesOf(from, to);
  const east = cos2 * Math.sin(dRa_rad);
  const north = cos1 * sin2 - sin1 * cos2 * Math.cos(dRa_rad);
  return normaliseRightAscension(Math.atan2(east, north) * degPerRad);
}

function anglesOf(from: EquatorialPlace, to: EquatorialPlace) {
  // Wrapped before it becomes radians: 359.9999 to 0.0001 is a small angle with all its digits.
  const dRa = requireFinite(to.ra) - requireFinite(from.ra);
  const dRa_rad = (dRa - 360 * Math.round(dRa / 360)) * radPerDeg;
  const dec1_rad = requireDeclination(from.dec) * radPerDeg;
  const dec2_rad = requireDeclination(to.dec) * radPerDeg;
  return {
    dRa_rad,
    sin1: Math.sin(dec1_rad),
    cos1: Math.cos(dec1_rad),
    sin2: Math.sin(dec2_rad),
    cos2: Math.cos(dec2_rad),
  };
}

function requireFinite(ra: number): number {
  if (!Number.isFinite(ra))
    throw new RangeError(`Right ascension must be a finite number of degrees, not ${ra}.`);
  return ra;
}
