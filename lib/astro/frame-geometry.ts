import { airmassYoung1994 } from './airmass';
import { requireExposure_s } from './exposure-airmass';
import { horizontalPlace } from './horizontal-place';
import { moonSeparation } from './moon';
import type { Site } from './site';
import { skyMoment } from './sky-moment';
import { sunAltitude } from './sun';

export interface FrameOnSky {
  readonly site: Site;
  /** J2000; null with dec for a frame that points nowhere, such as a bias. [deg] */
  readonly ra: number | null;
  /** J2000; null with ra. [deg] */
  readonly dec: number | null;
  /** Shutter opens. [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
  /** [s] */
  readonly exposure_s: number;
}

/** What the log adds to a frame; all of it at mid-exposure. */
export interface FrameGeometry {
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcMid: number;
  /** Young 1994; null below the horizon, or without a position. [1] */
  readonly airmass: number | null;
  /** True, without refraction, negative below the horizon; null without a position. [deg] */
  readonly altitude: number | null;
  /** Positive west, −12 < h ≤ 12; null without a position. [h] */
  readonly hourAngle: number | null;
  /** From the Moon's centre as seen from the site; null without a position. [deg] */
  readonly moonSeparation: number | null;
  /** True, without refraction. [deg] */
  readonly sunAltitude: number;
}

/** Where a frame looked: airmass, altitude, hour angle, Moon and Sun at mid-exposure.
 * @param frame - site, J2000 place [deg] or nulls, start [ms since 1970], exposure [s]
 * @returns its geometry
 * @throws {RangeError} one of ra and dec without the other; any input not finite or not possible
 * @accuracy altitude 1 arcsec, Moon 0.01°, against ERFA but for UT1 (0.004° of hour angle at most)
 * @source Young 1994, Applied Optics 33, 1108; places by astronomy-engine 2.1.19 */
export function frameGeometry(frame: FrameOnSky): FrameGeometry {
  const { site, ra, dec } = frame;
  const utcMid = frame.utcStart + (requireExposure_s(frame.exposure_s) * 1000) / 2;
  const moment = skyMoment(site, utcMid);
  const sun = sunAltitude(moment);
  if (ra === null && dec === null) {
    return { utcMid, airmass: null, altitude: null, hourAngle: null, moonSeparation: null, sunAltitude: sun };
  }
  if (ra === null || dec === null) {
    throw new RangeError('A position needs both right ascension and declination, or neither.');
  }
  const { altitude, zenithDistance, hourAngle_hours } = horizontalPlace(moment, ra, dec);
  return {
    utcMid,
    airmass: zenithDistance <= 90 ? airmassYoung1994(zenithDistance) : null,
    altitude,
    hourAngle: hourAngle_hours,
    moonSeparation: moonSeparation(moment, ra, dec),
    sunAltitude: sun,
  };
}
