/** Stars that several tables of one night measured, found to be one by name or position. */
import { degPerRad, normaliseRightAscension } from '../astro/angles';
import { skyGrid } from '../astro/sky-grid';

/** Stars as single tables know them, shape (n) each. */
export interface TableStars {
  /** Key of the name; '' where the table gives positions only. */
  readonly keys: readonly string[];
  /** Sums of unit vectors to the star over its measurements, shape (n, 3) row-major; zero without a position [1]. */
  readonly vectors: Float64Array;
}

export interface MergedStars {
  /** Which star each one is, 0 … nStars − 1, in the order of their first appearance, shape (n). */
  readonly star: Uint32Array;
  readonly nStars: number;
  /** Mean position over all measurements, J2000 [deg]; NaN without one, shape (n stars) each. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
  /** Place in the list of the one that names each star: the first with a name, if any has one; shape (n stars). */
  readonly named: Uint32Array;
}

/** Within this a star without a name is one that is known [arcsec]; the usual tolerance of tables */
const tolerance = 2;
/** Farther apart than this, one name is two stars, such as number 12 of two fields [arcsec]; our own rule */
const sameName = 10;

/** Merges stars of one name, and stars without a name by position.
 * @param stars - shape (n) each, in the order of appearance
 * @returns which are one, and where they are [deg]
 * @throws {RangeError} when the vectors are not three for each star
 * @accuracy mean positions to 1e-9 deg
 * @source our own rules: one name is one star unless its positions lie 10″ apart; without a name the nearest star within 2″ */
export function mergeStars(stars: TableStars): MergedStars {
  const { keys, vectors } = stars;
  const n = keys.length;
  if (vectors.length !== 3 * n) throw new RangeError(`${n} stars need ${3 * n} components of vectors.`);
  const merged = newGroups(n);
  const byKey = new Map<string, number[]>();
  const near = skyGrid(tolerance);
  const groupOfPlace: number[] = [];
  const remember = (group: number, at: number): void => {
    const place = placeOf(vectors, at);
    if (place === null) return;
    near.add(place.ra, place.dec);
    groupOfPlace.push(group);
  };
  // Names first: a star without one may be a star that a later table names.
  for (let s = 0; s < n; s += 1) {
    const key = keys[s]!;
    if (key === '') continue;
    const namesakes = byKey.get(key) ?? [];
    const known = namesakes.find((group) => areNear(vectors, merged.named[group]!, s));
    const group = known ?? merged.add(s);
    if (known === undefined) byKey.set(key, [...namesakes, group]);
    merged.join(s, group);
    remember(group, s);
  }
  for (let s = 0; s < n; s += 1) {
    if (keys[s] !== '') continue;
    const place = placeOf(vectors, s);
    let nearest = Number.POSITIVE_INFINITY;
    let found: number | undefined;
    if (place !== null)
      near.within(place.ra, place.dec, (at, separation) => {
        if (separation >= nearest) return;
        nearest = separation;
        found = groupOfPlace[at]!;
      });
    const group = found ?? merged.add(s);
    merged.join(s, group);
    if (found === undefined) remember(group, s);
  }
  return inOrder(merged, vectors);
}

interface Groups {
  readonly star: Uint32Array;
  readonly first: number[];
  readonly named: number[];
  readonly add: (first: number) => number;
  readonly join: (star: number, group: number) => void;
}

function newGroups(n: number): Groups {
  const star = new Uint32Array(n);
  const first: number[] = [];
  const named: number[] = [];
  return {
    star,
    first,
    named,
    add: (at) => {
      named.push(at);
      return first.push(at) - 1;
    },
    join: (s, group) => {
      star[s] = group;
      if (s < first[group]!) first[group] = s;
    },
  };
}

/** Numbers groups in the order of their first star and averages their positions. */
function inOrder({ star, first, named }: Groups, vectors: Float64Array): MergedStars {
  const order = Uint32Array.from(first.keys()).sort((a, b) => first[a]! - first[b]!);
  const numberOf = new Uint32Array(first.length);
  order.forEach((group, number) => (numberOf[group] = number));
  const sums = new Float64Array(3 * first.length);
  star.forEach((group, s) => {
    const number = numberOf[group]!;
    star[s] = number;
    for (let axis = 0; axis < 3; axis += 1) sums[3 * number + axis]! += vectors[3 * s + axis]!;
  });
  const ra = new Float64Array(first.length).fill(Number.NaN);
  const dec = ra.slice();
  for (let number = 0; number < first.length; number += 1) {
    const place = placeOf(sums, number);
    if (place === null) continue;
    ra[number] = place.ra;
    dec[number] = place.dec;
  }
  return { star, nStars: first.length, ra, dec, named: Uint32Array.from(order, (group) => named[group]!) };
}

function placeOf(vectors: Float64Array, s: number): { readonly ra: number; readonly dec: number } | null {
  const [x, y, z] = [vectors[3 * s]!, vectors[3 * s + 1]!, vectors[3 * s + 2]!];
  if (x === 0 && y === 0 && z === 0) return null;
  return {
    ra: normaliseRightAscension(Math.atan2(y, x) * degPerRad),
    dec: Math.atan2(z, Math.hypot(x, y)) * degPerRad,
  };
}

/** Whether two stars of one name can be one: where a position is missing the name decides. */
function areNear(vectors: Float64Array, one: number, other: number): boolean {
  const [a, b] = [vectors.subarray(3 * one, 3 * one + 3), vectors.subarray(3 * other, 3 * other + 3)];
  const lengths = Math.hypot(...a) * Math.hypot(...b);
  if (lengths === 0) return true;
  const cross = Math.hypot(
    a[1]! * b[2]! - a[2]! * b[1]!,
    a[2]! * b[0]! - a[0]! * b[2]!,
    a[0]! * b[1]! - a[1]! * b[0]!,
  );
  const dot = a[0]! * b[0]! + a[1]! * b[1]! + a[2]! * b[2]!;
  return Math.atan2(cross, dot) * degPerRad * 3600 <= sameName;
}

/** A name for a star that has none, from its position.
 * @param ra - J2000 [deg]
 * @param dec - J2000 [deg]
 * @returns `Jhhmmss.ss±ddmmss.s`, truncated, not rounded, so that the name lies within its own digits
 * @throws {RangeError} not finite, or declination beyond ±90
 * @source designations of sources by position as the IAU recommends them; from memory */
export function nameOfPosition(ra: number, dec: number): string {
  if (!Number.isFinite(ra) || !(Math.abs(dec) <= 90)) throw new RangeError(`No place: ${ra}, ${dec}.`);
  // A ten-thousandth of the last digit keeps 0.29999… of binary fractions from losing a digit.
  const parts = (units: number, decimals: number, lead: number): string => {
    const scale = 10 ** decimals;
    const whole = Math.floor(units * scale + 1e-4);
    const seconds = whole % (60 * scale);
    const minutes = Math.floor(whole / (60 * scale));
    const two = (value: number): string => String(value).padStart(2, '0');
    const fraction = String(seconds % scale).padStart(decimals, '0');
    return `${two(Math.floor(minutes / 60) % lead)}${two(minutes % 60)}${two(Math.floor(seconds / scale))}.${fraction}`;
  };
  const hours = parts(normaliseRightAscension(ra) * 240, 2, 24);
  return `J${hours}${dec < 0 ? '-' : '+'}${parts(Math.abs(dec) * 3600, 1, 100)}`;
}
