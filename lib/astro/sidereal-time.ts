import { e_tilt } from 'astronomy-engine';
import { normaliseHours } from './angles';
import { engineTime } from './engine';
import { requireRange } from './require-range';
import { daysPerCentury } from './time-scales';

/** Seconds of arc in an hour of rotation. [arcsec/h] @source definition */
const arcsecPerHour = 54_000;

/** Greenwich mean sidereal time.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], UT1 taken as UTC
 * @returns GMST, 0 ≤ t < 24 [h]
 * @throws {RangeError} not finite, or outside 1900 to 2099
 * @accuracy 1 ms of the IAU 2006 expression; |UT1 − UTC| adds up to 0.9 s against the real sky
 * @source Kaplan 2005, US Naval Observatory Circular 179, eq. 2.11 and 2.12 */
export function gmst_hours(utc: number): number {
  const time = engineTime(utc);
  const t = time.tt / daysPerCentury;
  // Whole days turn the Earth by whole turns: left out here, or they would cost half the digits.
  const turns = 0.779057273264 + 0.00273781191135448 * time.ut + (time.ut % 1);
  const precession_arcsec =
    0.014506 +
    t * (4612.156534 + t * (1.3915817 + t * (-0.00000044 + t * (-0.000029956 - 0.0000000368 * t))));
  return normaliseHours((turns % 1) * 24 + precession_arcsec / arcsecPerHour);
}

/** Greenwich apparent sidereal time: the mean one plus the equation of the equinoxes.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z], UT1 taken as UTC
 * @returns GAST, 0 ≤ t < 24 [h]
 * @throws {RangeError} not finite, or outside 1900 to 2099
 * @accuracy 0.02 s against ERFA (short nutation series)
 * @source Kaplan 2005, US Naval Observatory Circular 179, eq. 2.13 and 2.14; nutation of astronomy-engine 2.1.19 */
export function gast_hours(utc: number): number {
  const equationOfEquinoxes_s = e_tilt(engineTime(utc)).ee;
  return normaliseHours(gmst_hours(utc) + equationOfEquinoxes_s / 3600);
}

/** Local mean sidereal time.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @param longitude - east positive [deg], −180 to 360
 * @returns LMST, 0 ≤ t < 24 [h]
 * @throws {RangeError} not finite, or outside 1900 to 2099
 * @accuracy as gmst_hours
 * @source definition */
export function lmst_hours(utc: number, longitude: number): number {
  return normaliseHours(gmst_hours(utc) + eastHours(longitude));
}

/** Local apparent sidereal time: the right ascension of date that stands on the meridian.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @param longitude - east positive [deg], −180 to 360
 * @returns LAST, 0 ≤ t < 24 [h]
 * @throws {RangeError} not finite, or outside 1900 to 2099
 * @accuracy as gast_hours
 * @source definition */
export function last_hours(utc: number, longitude: number): number {
  return normaliseHours(gast_hours(utc) + eastHours(longitude));
}

function eastHours(longitude: number): number {
  return requireRange(longitude, { name: 'Longitude', unit: 'degrees east', min: -180, max: 360 }) / 15;
}
