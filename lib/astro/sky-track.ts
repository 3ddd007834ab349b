/**
 * The sky of a night on a grid of times: computed once per night, then any number of fields are drawn on it. Small
 * enough for the browser: a night at every 5 minutes takes some 20 ms, a field's curve well under 1 ms.
 */
import { airmassYoung1994 } from './airmass';
import type { TimeWindow } from './altitude-search';
import { apparentDirection } from './apparent-place';
import { altitudeOf } from './horizontal-place';
import { moonAltitude, moonDirection, moonLight } from './moon';
import type { Site } from './site';
import { type SkyMoment, skyMoment } from './sky-moment';
import { sunAltitude } from './sun';
import { type Vector3, angleBetween } from './vector';

/** A longer grid is a mistake in the step, not a night. [1] @source our own limit */
const maxPoints = 20_000;

export interface SkyTrack {
  /** Grid, both ends of the window included. [ms since 1970-01-01T00:00:00Z], shape (n) */
  readonly utc: Float64Array;
  /** True. [deg], shape (n) */
  readonly sunAltitude: Float64Array;
  /** True, topocentric. [deg], shape (n) */
  readonly moonAltitude: Float64Array;
  /** [1], shape (n) */
  readonly moonIlluminatedFraction: Float64Array;
  /** Local apparent sidereal time. [h], shape (n) */
  readonly last_hours: Float64Array;
  /** What all fields share at each grid point, shape (n). */
  readonly moments: readonly SkyMoment[];
  /** The Moon from the site at each grid point. [light seconds], shape (n) */
  readonly moonDirections: readonly Vector3[];
}

/** Sun, Moon and sidereal time on a grid of times.
 * @param site - longitude, latitude [deg], elevation [m]
 * @param window - first and last grid point, as a rule from nightBounds [ms since 1970]
 * @param step_s - wanted spacing, shortened so that it divides the window evenly [s]
 * @returns columns of shape (n), n = ⌈window / step⌉ + 1
 * @throws {RangeError} impossible site; empty window; step not positive; more than 20,000 points
 * @accuracy as sunAltitude and moonAltitude
 * @source astronomy-engine 2.1.19 */
export function skyTrack(site: Site, window: TimeWindow, step_s: number): SkyTrack {
  const length_ms = window.end - window.start;
  if (!(length_ms > 0)) throw new RangeError('A window of time must end after it starts.');
  const steps = Math.ceil(length_ms / (step_s * 1000));
  if (!(step_s > 0) || steps >= maxPoints) {
    throw new RangeError(`A step of ${step_s} s does not give a grid of 2 to ${maxPoints} points.`);
  }
  const moments = Array.from({ length: steps + 1 }, (_, i) =>
    skyMoment(site, window.start + (length_ms * i) / steps),
  );
  return {
    utc: Float64Array.from(moments, (moment) => moment.utc),
    sunAltitude: Float64Array.from(moments, sunAltitude),
    moonAltitude: Float64Array.from(moments, moonAltitude),
    moonIlluminatedFraction: Float64Array.from(moments, (moment) => moonLight(moment).illuminatedFraction),
    last_hours: Float64Array.from(moments, (moment) => moment.last_hours),
    moments,
    moonDirections: moments.map(moonDirection),
  };
}

export interface FieldTrack {
  /** Young 1994; NaN where the field is below the horizon. [1], shape (n) */
  readonly airmass: Float64Array;
  /** True. [deg], shape (n) */
  readonly altitude: Float64Array;
  /** From the Moon's centre as seen from the site. [deg], shape (n) */
  readonly moonSeparation: Float64Array;
}

/** A field's way through the night, on the grid of a sky track.
 * @param track - from skyTrack, shape (n)
 * @param ra - J2000 right ascension of the field [deg]
 * @param dec - J2000 declination of the field [deg]
 * @returns airmass [1], altitude [deg] and Moon separation [deg], each of shape (n)
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy as frameGeometry
 * @source Young 1994, Applied Optics 33, 1108; places by astronomy-engine 2.1.19 */
export function airmassCurve(track: SkyTrack, ra: number, dec: number): FieldTrack {
  const n = track.moments.length;
  const curve = {
    airmass: new Float64Array(n).fill(NaN),
    altitude: new Float64Array(n),
    moonSeparation: new Float64Array(n),
  };
  for (const [i, moment] of track.moments.entries()) {
    const direction = apparentDirection(moment, ra, dec);
    const altitude = altitudeOf(moment, direction);
    curve.altitude[i] = altitude;
    if (altitude >= 0) curve.airmass[i] = airmassYoung1994(90 - altitude);
    const moon = track.moonDirections[i];
    curve.moonSeparation[i] = moon === undefined ? NaN : angleBetween(moon, direction);
  }
  return curve;
}
