import { jdUtc, sPerDay } from './julian-date';
import { taiMinusUtc_s } from './leap-seconds';

/** Terrestrial Time minus International Atomic Time. [s] @source IAU 1991, recommendation IV */
export const ttMinusTai_s = 32.184;
/** Julian date of the epoch J2000.0 (2000 January 1, 12h TT). [d] @source IAU 1976 definition */
export const j2000Jd = 2451545;
/** Days in a Julian century. [d] @source definition */
export const daysPerCentury = 36525;

/** Terrestrial Time minus UTC.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], not before 1972
 * @returns TT − UTC, 69.184 s since 2017 [s]
 * @throws {RangeError} before 1972, or not finite
 * @accuracy exact for announced leap seconds
 * @source IERS Bulletin C; IAU 1991, recommendation IV */
export function ttMinusUtc_s(utc: number): number {
  return ttMinusTai_s + taiMinusUtc_s(utc);
}

/** Julian date on the scale of Terrestrial Time.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], not before 1972
 * @returns JD(TT) [d]
 * @throws {RangeError} before 1972, or not finite
 * @accuracy 40 µs, the spacing of doubles at JD 2.4 million
 * @source IERS Bulletin C; IAU 1991, recommendation IV */
export function jdTt(utc: number): number {
  return jdUtc(utc) + ttMinusUtc_s(utc) / sPerDay;
}

/** Barycentric Dynamical Time minus Terrestrial Time: the Earth's clock runs slow near perihelion.
 * @param jd_tt - JD(TT) [d]
 * @returns TDB − TT, within ±1.7 ms [s]
 * @throws {RangeError} when not finite
 * @accuracy 10 µs from 1600 to 2200, by the source's own statement; the observer's place on Earth (2 µs) is left out
 * @source Kaplan 2005, US Naval Observatory Circular 179, eq. 2.6 */
export function tdbMinusTt_s(jd_tt: number): number {
  if (!Number.isFinite(jd_tt))
    throw new RangeError(`A Julian date must be a finite number of days, not ${jd_tt}.`);
  const t = (jd_tt - j2000Jd) / daysPerCentury;
  return (
    0.001657 * Math.sin(628.3076 * t + 6.2401) +
    0.000022 * Math.sin(575.3385 * t + 4.297) +
    0.000014 * Math.sin(1256.6152 * t + 6.1969) +
    0.000005 * Math.sin(606.9777 * t + 4.0212) +
    0.000005 * Math.sin(52.9691 * t + 0.4444) +
    0.000002 * Math.sin(21.3299 * t + 5.5431) +
    0.00001 * t * Math.sin(628.3076 * t + 4.249)
  );
}

/** Julian date on the scale of Barycentric Dynamical Time.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], not before 1972
 * @returns JD(TDB) [d]
 * @throws {RangeError} before 1972, or not finite
 * @accuracy 40 µs, the spacing of doubles at JD 2.4 million
 * @source Kaplan 2005, US Naval Observatory Circular 179, eq. 2.6 */
export function jdTdb(utc: number): number {
  const jd_tt = jdTt(utc);
  return jd_tt + tdbMinusTt_s(jd_tt) / sPerDay;
}
