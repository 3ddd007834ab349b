import { degPerRad, normaliseRightAscension, radPerDeg } from './angles';

/** A direction or a place in a right-handed frame: x to the equinox, z to the north pole, unless said otherwise. */
export interface Vector3 {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** A direction on the equator's grid. */
export interface EquatorialPlace {
  /** [deg], 0 ≤ ra < 360 */
  readonly ra: number;
  /** [deg] */
  readonly dec: number;
}

/** Unit vector of a right ascension and declination.
 * @param ra - any finite right ascension [deg]
 * @param dec - declination [deg]
 * @returns unit vector [1]
 * @throws nothing: the caller has checked its input
 * @accuracy rounding
 * @source spherical trigonometry */
export function directionOf(ra: number, dec: number): Vector3 {
  const ra_rad = ra * radPerDeg;
  const dec_rad = dec * radPerDeg;
  const cosDec = Math.cos(dec_rad);
  return { x: cosDec * Math.cos(ra_rad), y: cosDec * Math.sin(ra_rad), z: Math.sin(dec_rad) };
}

/** Right ascension and declination of a vector of any length.
 * @param vector - not the zero vector [any unit]
 * @returns ra and dec [deg]
 * @throws nothing
 * @accuracy rounding, at the poles too (no arc sine near ±1)
 * @source spherical trigonometry */
export function placeOf(vector: Vector3): EquatorialPlace {
  return {
    ra: normaliseRightAscension(Math.atan2(vector.y, vector.x) * degPerRad),
    dec: Math.atan2(vector.z, Math.hypot(vector.x, vector.y)) * degPerRad,
  };
}

/** Scalar product.
 * @param a - vector [unit of a]
 * @param b - vector [unit of b]
 * @returns a · b [product of the units]
 * @throws nothing
 * @accuracy rounding
 * @source definition */
export function dot(a: Vector3, b: Vector3): number {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

/** Vector product.
 * @param a - vector [unit of a]
 * @param b - vector [unit of b]
 * @returns a × b [product of the units]
 * @throws nothing
 * @accuracy rounding
 * @source definition */
export function cross(a: Vector3, b: Vector3): Vector3 {
  return { x: a.y * b.z - a.z * b.y, y: a.z * b.x - a.x * b.z, z: a.x * b.y - a.y * b.x };
}

/** A vector's length.
 * @param a - vector [any unit]
 * @returns length [unit of a]
 * @throws nothing
 * @accuracy rounding
 * @source definition */
export function lengthOf(a: Vector3): number {
  return Math.sqrt(dot(a, a));
}

/** a + factor · b.
 * @param a - vector [unit of a]
 * @param factor - multiplies b [unit of a / unit of b]
 * @param b - vector [unit of b]
 * @returns the sum [unit of a]
 * @throws nothing
 * @accuracy rounding
 * @source definition */
export function addScaled(a: Vector3, factor: number, b: Vector3): Vector3 {
  return { x: a.x + factor * b.x, y: a.y + factor * b.y, z: a.z + factor * b.z };
}

/** Angle between two vectors of any length.
 * @param a - not the zero vector [any unit]
 * @param b - not the zero vector [any unit]
 * @returns 0 to 180 [deg]
 * @throws nothing
 * @accuracy rounding, for tiny angles and near 180° too (an arc cosine would lose half the digits)
 * @source definition: atan2(|a × b|, a · b) */
export function angleBetween(a: Vector3, b: Vector3): number {
  return Math.atan2(lengthOf(cross(a, b)), dot(a, b)) * degPerRad;
}
