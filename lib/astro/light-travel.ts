/**
 * Heliocentric and barycentric times: when the light would have reached the Sun, or the barycentre of the solar
 * system, so that a star's period does not breathe with the Earth's year. Plane waves; Einstein and Shapiro terms
 * (below 0.1 ms) are left out.
 */
import { radPerDeg } from './angles';
import { jdUtc, sPerDay } from './julian-date';
import { requireDeclination } from './require-range';
import type { SkyMoment } from './sky-moment';
import { jdTdb, jdTt } from './time-scales';
import { directionOf, dot } from './vector';

export interface LightTravel {
  /** To add to the observed time for the Sun's centre. [s] */
  readonly heliocentric_s: number;
  /** To add to the observed time for the barycentre of the solar system. [s] */
  readonly barycentric_s: number;
}

/** Light-travel time from the observer to the Sun's centre and to the barycentre, along a star's direction.
 * @param moment - site and instant
 * @param ra - J2000 right ascension [deg]
 * @param dec - J2000 declination [deg]
 * @returns seconds to add to the observed time, within ±505 [s]
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy 0.05 s against ERFA's epv00
 * @source r·n/c; Eastman, Siverd & Gaudi 2010, PASP 122, 935, eq. 2 */
export function lightTravel(moment: SkyMoment, ra: number, dec: number): LightTravel {
  if (!Number.isFinite(ra))
    throw new RangeError(`Right ascension must be a finite number of degrees, not ${ra}.`);
  const direction = directionOf(ra, requireDeclination(dec));
  return {
    heliocentric_s: dot(moment.fromSun_s, direction),
    barycentric_s: dot(moment.fromBarycentre_s, direction),
  };
}

export interface StarTimes {
  /** [d] */
  readonly jdUtc: number;
  /** Heliocentric, UTC scale. [d] */
  readonly hjdUtc: number;
  /** Heliocentric, TT scale. [d] */
  readonly hjdTt: number;
  /** Barycentric, TDB scale. [d] */
  readonly bjdTdb: number;
}

/** JD, HJD and BJD of one observation of one star.
 * @param moment - site and instant, as a rule mid-exposure
 * @param ra - J2000 right ascension [deg]
 * @param dec - J2000 declination [deg]
 * @returns the four dates [d]
 * @throws {RangeError} before 1972; not finite; declination beyond ±90
 * @accuracy 0.05 s against ERFA
 * @source Eastman, Siverd & Gaudi 2010, PASP 122, 935 */
export function starTimes(moment: SkyMoment, ra: number, dec: number): StarTimes {
  const { heliocentric_s, barycentric_s } = lightTravel(moment, ra, dec);
  return {
    jdUtc: jdUtc(moment.utc),
    hjdUtc: jdUtc(moment.utc) + heliocentric_s / sPerDay,
    hjdTt: jdTt(moment.utc) + heliocentric_s / sPerDay,
    bjdTdb: jdTdb(moment.utc) + barycentric_s / sPerDay,
  };
}

export interface StarTimeColumns {
  readonly hjdUtc: Float64Array;
  readonly hjdTt: Float64Array;
  readonly bjdTdb: Float64Array;
}

/** HJD and BJD of many stars on one frame.
 * @param moment - site and instant, as a rule mid-exposure
 * @param ra - J2000 right ascensions [deg], shape (n)
 * @param dec - J2000 declinations [deg], shape (n)
 * @returns heliocentric (UTC, TT) and barycentric (TDB) Julian dates [d], each of shape (n)
 * @throws {RangeError} before 1972; columns of unequal length; a value not finite or a declination beyond ±90
 * @accuracy 0.05 s against ERFA
 * @source Eastman, Siverd & Gaudi 2010, PASP 122, 935 */
export function starTimeColumns(moment: SkyMoment, ra: Float64Array, dec: Float64Array): StarTimeColumns {
  if (ra.length !== dec.length) {
    throw new RangeError(
      `The columns differ in length: ${ra.length} right ascensions, ${dec.length} declinations.`,
    );
  }
  const n = ra.length;
  const columns = { hjdUtc: new Float64Array(n), hjdTt: new Float64Array(n), bjdTdb: new Float64Array(n) };
  const base = { utc: jdUtc(moment.utc), tt: jdTt(moment.utc), tdb: jdTdb(moment.utc) };
  const { fromSun_s: sun, fromBarycentre_s: bary } = moment;
  for (const [i, ra_deg] of ra.entries()) {
    const dec_deg = dec[i] ?? NaN;
    if (!Number.isFinite(ra_deg) || !(Math.abs(dec_deg) <= 90)) {
      throw new RangeError(
        `Row ${i}: no place on the sky at right ascension ${ra_deg}, declination ${dec_deg}.`,
      );
    }
    const cosDec = Math.cos(dec_deg * radPerDeg);
    const x = cosDec * Math.cos(ra_deg * radPerDeg);
    const y = cosDec * Math.sin(ra_deg * radPerDeg);
    const z = Math.sin(dec_deg * radPerDeg);
    const helio_d = (sun.x * x + sun.y * y + sun.z * z) / sPerDay;
    columns.hjdUtc[i] = base.utc + helio_d;
    columns.hjdTt[i] = base.tt + helio_d;
    columns.bjdTdb[i] = base.tdb + (bary.x * x + bary.y * y + bary.z * z) / sPerDay;
  }
  return columns;
}
