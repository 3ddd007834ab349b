import { skyGrid } from '@/lib/astro/sky-grid';
import { starKey } from '@/lib/contracts/star-name';
import { growingArray } from './growing-array';
import { pairIndex } from './pair-index';

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
  readonly frameOfRow: (row: number) => number;
  readonly starOfRow: (row: number) => number;
}

export interface StarRow {
  readonly line: number;
  readonly frame: number;
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
}

/** Spellings that are looked up without working out their key again. */
const rememberedSpellings = 200_000;
/** Two positions on one frame nearer than this are one row written twice. [deg]: 0.004 arcsec */
const positionStep = 1e-6;

export function starRegister(tolerance_arcsec: number): StarRegister {
  const frameOfRow = growingArray(Int32Array);
  const starOfRow = growingArray(Int32Array);
  const lineOfRow = growingArray(Int32Array);
  const [raOfRow, decOfRow] = [growingArray(Int32Array), growingArray(Int32Array)];
  const measured = pairIndex(starOfRow.get, frameOfRow.get);
  const names: string[] = [];
  const [ra, dec] = [growingArray(Float64Array), growingArray(Float64Array)];
  const rowsOf = growingArray(Int32Array);
  const bySpelling = new Map<string, number>();
  const byKey = new Map<string, number>();
  const grid = skyGrid(tolerance_arcsec);
  const starOfPlace = growingArray(Int32Array);

  /** Only nameless rows need their position again; a table of names alone spends no memory on it. */
  function keepSteps(index: number, row: StarRow): void {
    while (raOfRow.length() < index) {
      raOfRow.push(0);
      decOfRow.push(0);
    }
    const [stepsRa, stepsDec] = steps(row);
    raOfRow.push(stepsRa);
    decOfRow.push(stepsDec);
  }

  function newStar(name: string, row: StarRow): number {
    names.push(name);
    ra.push(row.ra);
    dec.push(row.dec);
    rowsOf.push(0);
    return names.length - 1;
  }

  function namedStar(row: StarRow): number {
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
  }

  /** The nearest nameless star that this frame has not measured yet, or a new one; −line−1 for a row written twice. */
  function placedStar(row: StarRow): number {
    let best = -1;
    let bestDistance = Infinity;
    let twice = -1;
    grid.within(row.ra, row.dec, (place, distance) => {
      const star = starOfPlace.get(place);
      const earlier = measured.find(star, row.frame);
      if (earlier >= 0) {
        const [stepsRa, stepsDec] = steps(row);
        if (raOfRow.get(earlier) === stepsRa && decOfRow.get(earlier) === stepsDec) twice = earlier;
      } else if (distance < bestDistance) {
        bestDistance = distance;
        best = star;
      }
    });
    if (twice >= 0) return -twice - 1;
    if (best >= 0) return best;
    grid.add(row.ra, row.dec);
    starOfPlace.push(names.length);
    return newStar('', row);
  }

  function enter(row: StarRow): { readonly star: number } | { readonly firstLine: number } {
    const star = row.name === '' ? placedStar(row) : namedStar(row);
    const twice = star < 0 ? -star - 1 : row.name === '' ? -1 : measured.find(star, row.frame);
    if (twice >= 0) return { firstLine: lineOfRow.get(twice) };
    const index = starOfRow.length();
    starOfRow.push(star);
    frameOfRow.push(row.frame);
    lineOfRow.push(row.line);
    if (row.name === '') keepSteps(index, row);
    measured.enter(index, star, row.frame);
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
    rows: starOfRow.length,
    name: (star) => names[star] ?? '',
    key: (star) => starKey(names[star] ?? ''),
    ra: ra.get,
    dec: dec.get,
    rowsOf: rowsOf.get,
    frameOfRow: frameOfRow.get,
    starOfRow: starOfRow.get,
  };
}

const steps = ({ ra, dec }: StarRow): readonly [number, number] => [
  Math.round(ra / positionStep),
  Math.round(dec / positionStep),
];

/** A part of a longer text keeps all of it in memory; a copy keeps only itself. */
const ownCopy = (text: string): string => Buffer.from(text, 'utf8').toString('utf8');
