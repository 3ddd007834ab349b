import { radPerDeg } from './angles';

/** Places on the sphere, found again by position. Grows as places are added; poles and right ascension 0 are places like any other. */
export interface SkyGrid {
  /** Adds a place, ra and dec [deg]; returns its number, from 0. */
  readonly add: (ra: number, dec: number) => number;
  /** Visits every place within the radius of ra and dec [deg] with its number and separation [arcsec], in no particular order. */
  readonly within: (ra: number, dec: number, visit: (place: number, separation: number) => void) => void;
  readonly size: () => number;
}

/** Arcseconds per radian. [arcsec/rad] @source definition */
const arcsecPerRad = 3600 / radPerDeg;
/** Cells are wider than the radius, so that most places need only their own cell. [radii]; measured, no source */
const radiiPerCell = 8;

/** An index of unit vectors in cubic cells, so that no place on the sphere is special.
 * @param radius_arcsec - how far `within` looks [arcsec], 0 < radius ≤ 3600
 * @returns an empty index
 * @throws {RangeError} radius out of range
 * @accuracy separations to about 1e-10 arcsec; a place is found when its chord is at most the radius's, with rounding of 1e-16 rad
 * @source common practice, no source */
export function skyGrid(radius_arcsec: number): SkyGrid {
  if (!(radius_arcsec > 0 && radius_arcsec <= 3600)) {
    throw new RangeError(`The radius must lie in 0 to 3600 arcsec, not ${radius_arcsec}.`);
  }
  const reach = 2 * Math.sin(radius_arcsec / arcsecPerRad / 2);
  // A place exactly at the radius counts, whichever way its coordinates were rounded.
  const reachSquared = reach * reach * (1 + 1e-12) + 1e-31;
  const perCell = 1 / (reach * radiiPerCell);
  let vectors = new Float64Array(3 * 64);
  let next = new Int32Array(64);
  let heads = new Int32Array(256).fill(-1);
  let size = 0;

  const cellOf = (coordinate: number): number => Math.floor((coordinate + 1) * perCell);
  const bucketOf = (i: number, j: number, k: number): number =>
    (Math.imul(i, 73_856_093) ^ Math.imul(j, 19_349_663) ^ Math.imul(k, 83_492_791)) & (heads.length - 1);

  function link(place: number): void {
    const at = 3 * place;
    const bucket = bucketOf(cellOf(vectors[at]!), cellOf(vectors[at + 1]!), cellOf(vectors[at + 2]!));
    next[place] = heads[bucket]!;
    heads[bucket] = place;
  }

  function grow(): void {
    vectors = copyInto(new Float64Array(vectors.length * 2), vectors);
    next = copyInto(new Int32Array(next.length * 2), next);
    heads = new Int32Array(heads.length * 2).fill(-1);
    for (let place = 0; place < size; place += 1) link(place);
  }

  function add(ra: number, dec: number): number {
    if (size === next.length) grow();
    const cosDec = Math.cos(dec * radPerDeg);
    vectors[3 * size] = cosDec * Math.cos(ra * radPerDeg);
    vectors[3 * size + 1] = cosDec * Math.sin(ra * radPerDeg);
    vectors[3 * size + 2] = Math.sin(dec * radPerDeg);
    size += 1;
    link(size - 1);
    return size - 1;
  }

  function within(ra: number, dec: number, visit: (place: number, separation: number) => void): void {
    const cosDec = Math.cos(dec * radPerDeg);
    const x = cosDec * Math.cos(ra * radPerDeg);
    const y = cosDec * Math.sin(ra * radPerDeg);
    const z = Math.sin(dec * radPerDeg);
    for (let i = cellOf(x - reach); i <= cellOf(x + reach); i += 1)
      for (let j = cellOf(y - reach); j <= cellOf(y + reach); j += 1)
        for (let k = cellOf(z - reach); k <= cellOf(z + reach); k += 1) visitCell(i, j, k);

    function visitCell(i: number, j: number, k: number): void {
      for (let place = heads[bucketOf(i, j, k)]!; place >= 0; place = next[place]!) {
        const [px, py, pz] = [vectors[3 * place]!, vectors[3 * place + 1]!, vectors[3 * place + 2]!];
        const squared = (px - x) ** 2 + (py - y) ** 2 + (pz - z) ** 2;
        if (squared > reachSquared) continue;
        // Two cells may share a bucket: only a place of this very cell is visited for it.
        if (cellOf(px) !== i || cellOf(py) !== j || cellOf(pz) !== k) continue;
        visit(place, 2 * Math.asin(Math.sqrt(squared) / 2) * arcsecPerRad);
      }
    }
  }

  return { add, within, size: () => size };
}

function copyInto<T extends Float64Array | Int32Array>(target: T, source: T): T {
  target.set(source);
  return target;
}
