import { degPerHour, degPerRad, normaliseRightAscension, radPerDeg, wrapHourAngle } from './angles';
import { apparentDirection, ofDate } from './apparent-place';
import { requireDeclination, requireLatitude } from './require-range';
import type { SkyMoment } from './sky-moment';
import { type Vector3, placeOf } from './vector';

/** Where something stands over the horizon, without refraction. */
export interface HorizontalPlace {
  /** True altitude of the direction, negative below the horizon. [deg] */
  readonly altitude: number;
  /** 90 − altitude. [deg] */
  readonly zenithDistance: number;
  /** From north through east, 0 ≤ azimuth < 360. [deg] */
  readonly azimuth: number;
  /** Positive west of the meridian, −12 < h ≤ 12. [h] */
  readonly hourAngle_hours: number;
  /** From the direction of the north pole to that of the zenith, positive west of the meridian. [deg] */
  readonly parallacticAngle: number;
}

/** Altitude, azimuth, hour angle and parallactic angle of a star.
 * @param moment - site and instant
 * @param ra - J2000 right ascension [deg]
 * @param dec - J2000 declination [deg]
 * @returns its horizontal place
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy 1 arcsec against ERFA but for UT1 (0.004° of hour angle at most)
 * @source spherical trigonometry on the apparent place */
export function horizontalPlace(moment: SkyMoment, ra: number, dec: number): HorizontalPlace {
  return horizontalPlaceOf(moment, apparentDirection(moment, ra, dec));
}

/** The same for an apparent direction that is known as a vector: Sun, Moon, or a star already aberrated.
 * @param moment - site and instant
 * @param direction - J2000 axes, not the zero vector [any unit]
 * @returns its horizontal place
 * @throws nothing
 * @accuracy rounding, beyond that of the direction
 * @source spherical trigonometry */
export function horizontalPlaceOf(moment: SkyMoment, direction: Vector3): HorizontalPlace {
  const place = placeOf(ofDate(moment, direction));
  const hourAngle_hours = wrapHourAngle(moment.last_hours - place.ra / degPerHour);
  return horizontalFromHourAngle(hourAngle_hours, place.dec, moment.site.latitude);
}

/** Horizontal place from an hour angle and a declination of date.
 * @param hourAngle_hours - positive west [h]
 * @param dec - declination of date [deg]
 * @param latitude - geodetic [deg]
 * @returns horizontal place; at the zenith azimuth is 0 when not defined
 * @throws {RangeError} not finite, or declination or latitude beyond ±90
 * @accuracy rounding, at the zenith and the poles too
 * @source spherical trigonometry */
export function horizontalFromHourAngle(
  hourAngle_hours: number,
  dec: number,
  latitude: number,
): HorizontalPlace {
  const h = wrapHourAngle(hourAngle_hours);
  const h_rad = h * degPerHour * radPerDeg;
  const dec_rad = requireDeclination(dec) * radPerDeg;
  const lat_rad = requireLatitude(latitude) * radPerDeg;
  const [sinLat, cosLat] = [Math.sin(lat_rad), Math.cos(lat_rad)];
  const [sinDec, cosDec] = [Math.sin(dec_rad), Math.cos(dec_rad)];
  const [sinH, cosH] = [Math.sin(h_rad), Math.cos(h_rad)];
  const north = cosLat * sinDec - sinLat * cosDec * cosH;
  const east = -cosDec * sinH;
  const up = sinLat * sinDec + cosLat * cosDec * cosH;
  const altitude = Math.atan2(up, Math.hypot(north, east)) * degPerRad;
  return {
    altitude,
    zenithDistance: 90 - altitude,
    azimuth: normaliseRightAscension(Math.atan2(east, north) * degPerRad),
    hourAngle_hours: h,
    parallacticAngle: Math.atan2(sinH * cosLat, sinLat * cosDec - cosLat * sinDec * cosH) * degPerRad,
  };
}

/** Altitude alone, for long columns of directions.
 * @param moment - site and instant
 * @param direction - apparent direction, J2000 axes, not the zero vector [any unit]
 * @returns true altitude [deg]
 * @throws nothing
 * @accuracy rounding, beyond that of the direction
 * @source spherical trigonometry */
export function altitudeOf(moment: SkyMoment, direction: Vector3): number {
  const { x, y, z } = ofDate(moment, direction);
  const last_rad = moment.last_hours * degPerHour * radPerDeg;
  const [sinLast, cosLast] = [Math.sin(last_rad), Math.cos(last_rad)];
  const towardsMeridian = x * cosLast + y * sinLast;
  const west = x * sinLast - y * cosLast;
  const north = moment.cosLatitude * z - moment.sinLatitude * towardsMeridian;
  const up = moment.sinLatitude * z + moment.cosLatitude * towardsMeridian;
  return Math.atan2(up, Math.hypot(north, west)) * degPerRad;
}
