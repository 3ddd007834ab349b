import { GeoMoon } from 'astronomy-engine';
import { degPerRad, radPerDeg } from './angles';
import { apparentDirection, ofDate } from './apparent-place';
import { engineTime } from './engine';
import { type HorizontalPlace, altitudeOf, horizontalPlaceOf } from './horizontal-place';
import { type SkyMoment, auLight_s } from './sky-moment';
import { sunDirection } from './sun';
import {
  type EquatorialPlace,
  type Vector3,
  addScaled,
  angleBetween,
  cross,
  dot,
  lengthOf,
  placeOf,
} from './vector';

/** The Moon's mean radius. [light seconds] @source IAU working group on cartographic coordinates, 2015: 1737.4 km */
const moonRadius_s = 1737.4 / 299_792.458;
/** Time that light takes from the Moon, near enough to date its place back. [ms] @source 384,400 km / c */
const moonLight_ms = 1282;

export interface MoonPlace extends EquatorialPlace, HorizontalPlace {
  /** From the site. [km] */
  readonly distance_km: number;
  /** Half the apparent disc. [deg] */
  readonly semidiameter: number;
}

/** The Moon as seen from the site.
 * @param moment - site and instant
 * @returns apparent topocentric place, J2000 axes [light seconds]
 * @throws nothing
 * @accuracy 0.003°, mostly the lunar theory
 * @source astronomy-engine 2.1.19 (Montenbruck & Pfleger's theory); aberration is that of the Moon's own motion, since
 *   Earth and Moon go round the Sun together */
export function moonDirection(moment: SkyMoment): Vector3 {
  return addScaled(moonFromEarth_s(moment), -1, moment.fromEarth_s);
}

/** The Moon's altitude.
 * @param moment - site and instant
 * @returns true altitude of the centre of the disc, topocentric, without refraction [deg]
 * @throws nothing
 * @accuracy 0.01° against ERFA but for UT1
 * @source astronomy-engine 2.1.19 */
export function moonAltitude(moment: SkyMoment): number {
  return altitudeOf(moment, moonDirection(moment));
}

/** The Moon's apparent place and where it stands over the horizon.
 * @param moment - site and instant
 * @returns right ascension and declination of date [deg], horizontal place, distance [km], semidiameter [deg]
 * @throws nothing
 * @accuracy 0.01° against ERFA but for UT1
 * @source astronomy-engine 2.1.19 */
export function moonPlace(moment: SkyMoment): MoonPlace {
  const direction = moonDirection(moment);
  return {
    ...placeOf(ofDate(moment, direction)),
    ...horizontalPlaceOf(moment, direction),
    distance_km: lengthOf(direction) * 299_792.458,
    semidiameter: moonSemidiameter(direction),
  };
}

/** Half the Moon's apparent disc.
 * @param direction - the Moon from the site [light seconds]
 * @returns angle [deg]
 * @throws nothing
 * @accuracy 0.1 arcsec (mean radius)
 * @source asin(radius / distance) */
export function moonSemidiameter(direction: Vector3): number {
  return Math.asin(moonRadius_s / lengthOf(direction)) * degPerRad;
}

/** Angle between a star and the centre of the Moon, as seen from the site.
 * @param moment - site and instant
 * @param ra - J2000 right ascension of the star [deg]
 * @param dec - J2000 declination of the star [deg]
 * @returns 0 to 180 [deg]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy 0.01°; a geocentric Moon would be up to 1° off
 * @source astronomy-engine 2.1.19 */
export function moonSeparation(moment: SkyMoment, ra: number, dec: number): number {
  return angleBetween(moonDirection(moment), apparentDirection(moment, ra, dec));
}

export interface MoonLight {
  /** Lit part of the disc's area, 0 to 1. [1] */
  readonly illuminatedFraction: number;
  /** From new to full. */
  readonly isWaxing: boolean;
  /** Angle between Sun and Moon as seen from the site, 0 to 180. [deg] */
  readonly elongation: number;
}

/** How much of the Moon is lit, as seen from the site.
 * @param moment - site and instant
 * @returns illuminated fraction [1], waxing or waning, elongation [deg]
 * @throws nothing
 * @accuracy 0.0005 against ERFA; almanacs give it from the Earth's centre, which differs by up to 0.008
 * @source k = (1 + cos i)/2, i = atan2(R sin E, r − R cos E): Meeus 1998, Astronomical Algorithms, eq. 48.1 and 48.3 */
export function moonLight(moment: SkyMoment): MoonLight {
  const moon = moonDirection(moment);
  const sun = sunDirection(moment);
  const elongation = angleBetween(moon, sun);
  const e_rad = elongation * radPerDeg;
  const sunDistance_s = lengthOf(moment.fromSun_s);
  const i_rad = Math.atan2(sunDistance_s * Math.sin(e_rad), lengthOf(moon) - sunDistance_s * Math.cos(e_rad));
  // New and full Moon are defined from the Earth's centre: the site's parallax must not move them by two hours.
  const northward = cross(addScaled(moment.fromEarth_s, -1, moment.fromSun_s), moonFromEarth_s(moment));
  return {
    illuminatedFraction: (1 + Math.cos(i_rad)) / 2,
    isWaxing: dot(northward, eclipticPole) > 0,
    elongation,
  };
}

/** North pole of the ecliptic on J2000 axes, obliquity 84381.406 arcsec. [1] @source IAU 2006 */
const eclipticPole: Vector3 = { x: 0, y: -0.3977769691, z: 0.9174821431 };

function moonFromEarth_s(moment: SkyMoment): Vector3 {
  const moon = GeoMoon(engineTime(moment.utc - moonLight_ms));
  return { x: moon.x * auLight_s, y: moon.y * auLight_s, z: moon.z * auLight_s };
}
