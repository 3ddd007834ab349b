import { airmassCurve, type SkyTrack } from './sky-track';
import type { EquatorialPlace } from './vector';

/** When a field is best, and when it can be observed at all, on the grid of a sky track. */
export interface FieldVisibility {
  /** Lowest airmass while it can be observed. [1] */
  readonly airmass: number;
  /** When that is. [ms since 1970-01-01T00:00:00Z] */
  readonly utc: number;
  /** First and last grid point at which it can be observed; it may set and rise again between them. [ms since 1970] */
  readonly from: number;
  readonly to: number;
  /** From the Moon's centre when it is best. [deg] */
  readonly moonSeparation: number;
}

/** When in a stretch of time a field is highest, among the moments when it is above a limit.
 * @param track - from skyTrack over the hours that count, as a rule the dark ones
 * @param field - J2000 place [deg]
 * @param minAltitude - lowest pointing of the telescope [deg]
 * @returns the best moment and the span, or null when the field never reaches the limit
 * @throws {RangeError} not finite, or declination beyond ±90
 * @accuracy times to the step of the track; airmass as frameGeometry
 * @source definition */
export function fieldVisibility(
  track: SkyTrack,
  field: EquatorialPlace,
  minAltitude: number,
): FieldVisibility | null {
  const { altitude, airmass, moonSeparation } = airmassCurve(track, field.ra, field.dec);
  const up = Array.from(track.utc.keys()).filter((i) => altitude[i]! >= minAltitude && airmass[i]! > 0);
  const [first] = up;
  const last = up.at(-1);
  if (first === undefined || last === undefined) return null;
  const best = up.reduce((lowest, i) => (airmass[i]! < airmass[lowest]! ? i : lowest), first);
  return {
    airmass: airmass[best]!,
    utc: track.utc[best]!,
    from: track.utc[first]!,
    to: track.utc[last]!,
    moonSeparation: moonSeparation[best]!,
  };
}
