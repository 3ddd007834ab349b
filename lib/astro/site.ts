import { requireLatitude, requireRange } from './require-range';

/** Where a telescope stands, on the WGS84 ellipsoid. */
export interface Site {
  /** East positive. [deg] */
  readonly longitude: number;
  /** Geodetic, north positive. [deg] */
  readonly latitude: number;
  /** Above the ellipsoid; above sea level is good enough. [m] */
  readonly elevation: number;
}

/** Lets a site pass, or says which of its numbers cannot be.
 * @param site - longitude and latitude [deg], elevation [m]
 * @returns the site unchanged
 * @throws {RangeError} longitude beyond −180 … 360, latitude beyond ±90, elevation beyond −500 … 10,000 m
 * @accuracy exact
 * @source our own limits: both longitude conventions in use are accepted */
export function requireSite(site: Site): Site {
  requireRange(site.longitude, { name: 'Longitude', unit: 'degrees east', min: -180, max: 360 });
  requireLatitude(site.latitude);
  requireRange(site.elevation, { name: 'Elevation', unit: 'metres', min: -500, max: 10_000 });
  return site;
}
