import { requireDeclination } from './require-range';
import type { SkyMoment } from './sky-moment';
import { type EquatorialPlace, type Vector3, addScaled, directionOf, dot, placeOf } from './vector';

/** Direction in which a star is seen: the observer's motion tips it forward by up to 20.5 arcsec.
 * @param moment - site and instant
 * @param geometric - unit vector to the star, J2000 axes [1]
 * @returns apparent direction, J2000 axes, length 1 but for 1e-4 [1]
 * @throws nothing
 * @accuracy 0.002 arcsec (second order of v/c left out); light deflection by the Sun left out, 0.02 arcsec at 30°
 * @source Kaplan 2005, US Naval Observatory Circular 179, section 2.6: first order of aberration */
export function aberrated(moment: SkyMoment, geometric: Vector3): Vector3 {
  return addScaled(geometric, 1, moment.velocity_c);
}

/** Turns a vector from J2000 axes to the true equator and equinox of date (precession and nutation).
 * @param moment - site and instant
 * @param vector - J2000 axes [any unit]
 * @returns the same vector on axes of date [same unit]
 * @throws nothing
 * @accuracy 0.1 arcsec from 1900 to 2099
 * @source astronomy-engine 2.1.19 (IAU 2006 precession, short IAU 2000B nutation) */
export function ofDate(moment: SkyMoment, vector: Vector3): Vector3 {
  const { toX, toY, toZ } = moment.toDate;
  return { x: dot(toX, vector), y: dot(toY, vector), z: dot(toZ, vector) };
}

/** Apparent place of a star: where the telescope's circles, set to the equator of date, find it.
 * @param moment - site and instant
 * @param ra - J2000 right ascension [deg]
 * @param dec - J2000 declination [deg]
 * @returns right ascension and declination of date [deg]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy 0.5 arcsec against ERFA; no proper motion, no parallax
 * @source Kaplan 2005, US Naval Observatory Circular 179, chapters 2 and 5 */
export function apparentPlace(moment: SkyMoment, ra: number, dec: number): EquatorialPlace {
  return placeOf(ofDate(moment, apparentDirection(moment, ra, dec)));
}

/** Apparent direction of a star on J2000 axes, for angles against the Sun and the Moon.
 * @param moment - site and instant
 * @param ra - J2000 right ascension [deg]
 * @param dec - J2000 declination [deg]
 * @returns direction, J2000 axes, length 1 but for 1e-4 [1]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy as aberrated
 * @source Kaplan 2005, US Naval Observatory Circular 179, section 2.6 */
export function apparentDirection(moment: SkyMoment, ra: number, dec: number): Vector3 {
  if (!Number.isFinite(ra))
    throw new RangeError(`Right ascension must be a finite number of degrees, not ${ra}.`);
  return aberrated(moment, directionOf(ra, requireDeclination(dec)));
}
