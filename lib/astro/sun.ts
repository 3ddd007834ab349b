import { aberrated, ofDate } from './apparent-place';
import { type HorizontalPlace, altitudeOf, horizontalPlaceOf } from './horizontal-place';
import { type SkyMoment, auLight_s } from './sky-moment';
import { type EquatorialPlace, type Vector3, lengthOf, placeOf } from './vector';

export interface SunPlace extends EquatorialPlace, HorizontalPlace {
  /** [au] */
  readonly distance_au: number;
}

/** Direction in which the Sun's centre is seen from the site.
 * @param moment - site and instant
 * @returns apparent topocentric direction, J2000 axes, length 1 but for 1e-4 [1]
 * @throws nothing
 * @accuracy 1 arcsec
 * @source astronomy-engine 2.1.19 (VSOP87), first order of aberration; the Sun's own motion in 8 minutes (0.01 arcsec)
 *   is left out */
export function sunDirection(moment: SkyMoment): Vector3 {
  const distance_s = lengthOf(moment.fromSun_s);
  const { x, y, z } = moment.fromSun_s;
  return aberrated(moment, { x: -x / distance_s, y: -y / distance_s, z: -z / distance_s });
}

/** The Sun's altitude.
 * @param moment - site and instant
 * @returns true altitude of the centre of the disc, topocentric, without refraction [deg]
 * @throws nothing
 * @accuracy 0.001° against ERFA but for UT1 (0.004° at most)
 * @source astronomy-engine 2.1.19 (VSOP87) */
export function sunAltitude(moment: SkyMoment): number {
  return altitudeOf(moment, sunDirection(moment));
}

/** The Sun's apparent place and where it stands over the horizon.
 * @param moment - site and instant
 * @returns right ascension and declination of date [deg], horizontal place, distance [au]
 * @throws nothing
 * @accuracy 0.001° against ERFA but for UT1
 * @source astronomy-engine 2.1.19 (VSOP87) */
export function sunPlace(moment: SkyMoment): SunPlace {
  const direction = sunDirection(moment);
  return {
    ...placeOf(ofDate(moment, direction)),
    ...horizontalPlaceOf(moment, direction),
    distance_au: lengthOf(moment.fromSun_s) / auLight_s,
  };
}
