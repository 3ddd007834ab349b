/**
 * The sky at one instant from one site: everything that all stars of a frame share, computed once.
 *
 * Axes: mean equator and equinox of J2000, taken for the ICRS (they differ by 0.02 arcsec). UT1 is taken as UTC.
 */
import {
  BaryState,
  Body,
  HelioVector,
  Observer,
  ObserverState,
  Rotation_EQJ_EQD,
  e_tilt,
} from 'astronomy-engine';
import { normaliseHours, radPerDeg } from './angles';
import { engineTime } from './engine';
import { sPerDay } from './julian-date';
import { gmst_hours } from './sidereal-time';
import { type Site, requireSite } from './site';
import { type Vector3, addScaled } from './vector';

/** Light-travel time of one astronomical unit. [s/au] @source IAU 2012 resolution B2 and the speed of light */
export const auLight_s = 499.004783836;

/** Rows of a rotation from J2000 axes to the true equator and equinox of date. */
export interface Rotation {
  readonly toX: Vector3;
  readonly toY: Vector3;
  readonly toZ: Vector3;
}

export interface SkyMoment {
  readonly site: Site;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utc: number;
  /** Local apparent sidereal time. [h] */
  readonly last_hours: number;
  readonly sinLatitude: number;
  readonly cosLatitude: number;
  readonly toDate: Rotation;
  /** Observer's velocity against the barycentre of the solar system. [speed of light] */
  readonly velocity_c: Vector3;
  /** Observer as seen from the centre of the Sun. [light seconds] */
  readonly fromSun_s: Vector3;
  /** Observer as seen from the barycentre of the solar system. [light seconds] */
  readonly fromBarycentre_s: Vector3;
  /** Observer as seen from the centre of the Earth. [light seconds] */
  readonly fromEarth_s: Vector3;
}

/** Everything that directions at one instant and site have in common.
 * @param site - longitude, latitude [deg], elevation [m]
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @returns rotation to date, sidereal time, velocity, places of the observer
 * @throws {RangeError} impossible site; instant not finite or outside 1900 to 2099
 * @accuracy directions 0.5 arcsec against ERFA but for UT1; light times 0.05 s
 * @source astronomy-engine 2.1.19 (VSOP87, IAU 2006 precession, short IAU 2000B nutation) */
export function skyMoment(site: Site, utc: number): SkyMoment {
  requireSite(site);
  const time = engineTime(utc);
  const earth = BaryState(Body.Earth, time);
  const earthFromSun = HelioVector(Body.Earth, time);
  const observer = ObserverState(time, new Observer(site.latitude, site.longitude, site.elevation), false);
  const fromEarth_s = addScaled(zero, auLight_s, observer);
  return {
    site,
    utc,
    last_hours: normaliseHours(gmst_hours(utc) + e_tilt(time).ee / 3600 + site.longitude / 15),
    sinLatitude: Math.sin(site.latitude * radPerDeg),
    cosLatitude: Math.cos(site.latitude * radPerDeg),
    toDate: rotationToDate(Rotation_EQJ_EQD(time).rot),
    velocity_c: addScaled(zero, auLight_s / sPerDay, {
      x: earth.vx + observer.vx,
      y: earth.vy + observer.vy,
      z: earth.vz + observer.vz,
    }),
    fromSun_s: addScaled(fromEarth_s, auLight_s, earthFromSun),
    fromBarycentre_s: addScaled(fromEarth_s, auLight_s, earth),
    fromEarth_s,
  };
}

const zero: Vector3 = { x: 0, y: 0, z: 0 };

/** The engine keeps its matrices by source axis first, then target axis. */
function rotationToDate(rot: readonly (readonly number[])[]): Rotation {
  const row = (target: 0 | 1 | 2): Vector3 => ({
    x: rot[0]?.[target] ?? NaN,
    y: rot[1]?.[target] ?? NaN,
    z: rot[2]?.[target] ?? NaN,
  });
  return { toX: row(0), toY: row(1), toZ: row(2) };
}
