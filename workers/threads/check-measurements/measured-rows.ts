import { growingArray } from './growing-array';
import { pairIndex } from './pair-index';

export interface StarRow {
  readonly line: number;
  readonly frame: number;
  /** Empty for none. */
  readonly name: string;
  /** J2000; NaN for none. [deg] */
  readonly ra: number;
  readonly dec: number;
}

/** Which star every row measured on which frame, in a few bytes a row. Rows, stars and frames count from 0. */
export interface MeasuredRows {
  readonly enter: (star: number, row: StarRow) => void;
  /** The row in which a frame measured a star, or −1. */
  readonly find: (star: number, frame: number) => number;
  /** Whether an entered nameless row has the position of another: then it is one row written twice. */
  readonly isAtPlaceOf: (entered: number, row: StarRow) => boolean;
  readonly rows: () => number;
  readonly starOf: (row: number) => number;
  readonly frameOf: (row: number) => number;
  readonly lineOf: (row: number) => number;
}

/** Two positions on one frame nearer than this are one. [deg]: 0.004 arcsec */
const step = 1e-6;

export function measuredRows(): MeasuredRows {
  const frames = growingArray(Int32Array);
  const stars = growingArray(Int32Array);
  const lines = growingArray(Int32Array);
  const [raSteps, decSteps] = [growingArray(Int32Array), growingArray(Int32Array)];
  const pairs = pairIndex(stars.get, frames.get);

  /** Only nameless rows need their position again; a table of names alone spends no memory on it. */
  function keepPlace(index: number, row: StarRow): void {
    while (raSteps.length() < index) {
      raSteps.push(0);
      decSteps.push(0);
    }
    raSteps.push(Math.round(row.ra / step));
    decSteps.push(Math.round(row.dec / step));
  }

  return {
    enter: (star, row) => {
      const index = stars.length();
      stars.push(star);
      frames.push(row.frame);
      lines.push(row.line);
      if (row.name === '') keepPlace(index, row);
      pairs.enter(index, star, row.frame);
    },
    find: pairs.find,
    isAtPlaceOf: (entered, row) =>
      raSteps.get(entered) === Math.round(row.ra / step) &&
      decSteps.get(entered) === Math.round(row.dec / step),
    rows: stars.length,
    starOf: stars.get,
    frameOf: frames.get,
    lineOf: lines.get,
  };
}
