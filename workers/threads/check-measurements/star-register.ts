import { skyGrid } from '@/lib/astro/sky-grid';
import { starKey } from '@/lib/contracts/star-name';
import { growingArray } from './growing-array';
import { measuredRows, type MeasuredRows, type StarRow } from './measured-rows';

/** The distinct stars of a table and where each was measured. Rows and stars count from 0 here. */
export interface StarRegister {
  /**
   * Enters a row; name '' and NaN mean absent. Rows of one name are one star, in whatever spelling; rows without a name
   * are one star when they lie within the tolerance on different frames. A second measurement of a star on one frame is
   * not entered: the answer then names the line of the first.
   */
  readonly enter: (row: StarRow) => { readonly star: number } | { readonly firstLine: number };
  readonly stars: () => number;
  readonly rows: () => number;
  readonly name: (star: number) => string;
  /** As names are compared. */
  readonly key: (star: number) => string;
  /** Of the star's first row with a position; NaN where there is none. [deg] */
  readonly ra: (star: number) => number;
  readonly dec: (star: number) => number;
  readonly rowsOf: (star: number) => number;
  /** Line in which the star stands first. */
  readonly firstLine: (star: number) => number;
  readonly frameOfRow: (row: number) => number;
  readonly starOfRow: (row: number) => number;
}

export function starRegister(tolerance_arcsec: number): StarRegister {
  const names: string[] = [];
  const [ra, dec] = [growingArray(Float64Array), growingArray(Float64Array)];
  const [rowsOf, firstLine] = [growingArray(Int32Array), growingArray(Int32Array)];
  const measured = measuredRows();
  const newStar = (name: string, row: StarRow): number => {
    names.push(name);
    ra.push(row.ra);
    dec.push(row.dec);
    rowsOf.push(0);
    firstLine.push(row.line);
    return names.length - 1;
  };
  const named = namedStars(newStar);
  const placed = placedStars(tolerance_arcsec, measured, newStar);

  function enter(row: StarRow): { readonly star: number } | { readonly firstLine: number } {
    const star = row.name === '' ? placed(row) : named(row);
    const earlier = star < 0 ? -star - 1 : measured.find(star, row.frame);
    if (earlier >= 0) return { firstLine: measured.lineOf(earlier) };
    measured.enter(star, row);
    rowsOf.set(star, rowsOf.get(star) + 1);
    if (Number.isNaN(ra.get(star)) && !Number.isNaN(row.ra)) {
      ra.set(star, row.ra);
      dec.set(star, row.dec);
    }
    return { star };
  }

  return {
    enter,
    stars: () => names.length,
    rows: measured.rows,
    name: (star) => names[star] ?? '',
    key: (star) => starKey(names[star] ?? ''),
    ra: ra.get,
    dec: dec.get,
    rowsOf: rowsOf.get,
    firstLine: firstLine.get,
    frameOfRow: measured.frameOf,
    starOfRow: measured.starOf,
  };
}

type NewStar = (name: string, row: StarRow) => number;

/** Spellings that are looked up without working out their key again. */
const rememberedSpellings = 200_000;

/** Finds or makes the star of a name. */
function namedStars(newStar: NewStar): (row: StarRow) => number {
  const bySpelling = new Map<string, number>();
  const byKey = new Map<string, number>();
  return (row) => {
    const known = bySpelling.get(row.name);
    if (known !== undefined) return known;
    const key = starKey(row.name);
    let star = byKey.get(key);
    if (star === undefined) {
      star = newStar(ownCopy(row.name), row);
      byKey.set(ownCopy(key), star);
    }
    if (bySpelling.size < rememberedSpellings) bySpelling.set(ownCopy(row.name), star);
    return star;
  };
}

/**
 * Finds the nearest nameless star that the row's frame has not measured yet, or makes one: on one frame two near places
 * are two stars. A row that was written twice gives −1 less the number of the row that says the same.
 */
function placedStars(
  tolerance_arcsec: number,
  measured: MeasuredRows,
  newStar: NewStar,
): (row: StarRow) => number {
  const grid = skyGrid(tolerance_arcsec);
  const starOfPlace = growingArray(Int32Array);
  return (row) => {
    let best = -1;
    let bestDistance = Infinity;
    let twice = -1;
    grid.within(row.ra, row.dec, (place, distance) => {
      const star = starOfPlace.get(place);
      const earlier = measured.find(star, row.frame);
      if (earlier >= 0) {
        if (measured.isAtPlaceOf(earlier, row)) twice = earlier;
      } else if (distance < bestDistance) {
        bestDistance = distance;
        best = star;
      }
    });
    if (twice >= 0) return -twice - 1;
    if (best >= 0) return best;
    grid.add(row.ra, row.dec);
    const star = newStar('', row);
    starOfPlace.push(star);
    return star;
  };
}

/** A part of a longer text keeps all of it in memory; a copy keeps only itself. */
const ownCopy = (text: string): string => Buffer.from(text, 'utf8').toString('utf8');
