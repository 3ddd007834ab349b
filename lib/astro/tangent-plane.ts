/** A patch of the sky laid flat, for charts: the tangent plane at its centre, seen from the sphere's centre. */
import { degPerRad } from './angles';
import { requireDeclination } from './require-range';
import { addScaled, directionOf, dot, placeOf, type EquatorialPlace, type Vector3 } from './vector';

export interface PlaneOffset {
  /** Positive towards larger right ascension. [deg] */
  readonly east: number;
  /** [deg] */
  readonly north: number;
}

/** Where a place lies on the plane that touches the sphere at a centre (gnomonic projection).
 * @param centre - where the plane touches [deg]
 * @param place - less than 90° away [deg]
 * @returns offsets on the plane, near the centre those on the sky [deg]
 * @throws {RangeError} not finite, a declination beyond ±90, or a place 90° away or more, which the plane does not show
 * @accuracy rounding; at a pole east is the meridian 90° from the centre's right ascension
 * @source Calabretta and Greisen 2002, A&A 395, 1077, section 5.1.3 (TAN) */
export function tangentOffset(centre: EquatorialPlace, place: EquatorialPlace): PlaneOffset {
  requireDeclination(centre.dec);
  requireDeclination(place.dec);
  const towards = directionOf(place.ra, place.dec);
  const depth = dot(directionOf(centre.ra, centre.dec), towards);
  if (!(depth > 1e-9)) throw new RangeError('The place is 90° or more from the centre of the plane.');
  const east = directionOf(centre.ra + 90, 0);
  const north = directionOf(centre.ra, centre.dec + 90);
  return { east: (dot(east, towards) / depth) * degPerRad, north: (dot(north, towards) / depth) * degPerRad };
}

/** The middle of some places on the sphere: the direction of the sum of their unit vectors.
 * @param places - at least one [deg], shape (n)
 * @returns the middle [deg]
 * @throws {RangeError} no places, or places whose directions cancel, which have no middle
 * @accuracy rounding, across right ascension 0 and at the poles too
 * @source definition */
export function meanPlace(places: readonly EquatorialPlace[]): EquatorialPlace {
  const none: Vector3 = { x: 0, y: 0, z: 0 };
  const sum = places.reduce((total, { ra, dec }) => addScaled(total, 1, directionOf(ra, dec)), none);
  if (!(dot(sum, sum) > 1e-12)) throw new RangeError('These places have no middle.');
  return placeOf(sum);
}
