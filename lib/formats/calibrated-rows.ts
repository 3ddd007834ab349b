/** Calibrated magnitudes as CSV and JSON: rows of the table in, text out. */
import { calibratedColumns, flagNames } from '@/lib/contracts/calibrated-columns';
import { csvCell } from './csv-writer';

export type Cell = string | number | null;

/** What all rows of a result have in common. */
export interface ResultNames {
  readonly programme: string;
  readonly solution: string;
  readonly night: string;
}

/**
 * Values in the order of calibratedColumns from a stored row: star, ra, dec, five counts, six quantities of value, random
 * and systematic error, bjd, airmass, flags. The total error is made here.
 */
export function exportedCells(row: readonly Cell[], names: ResultNames): Cell[] {
  const cells = row.slice(0, quantityPlace);
  for (let at = quantityPlace; at < afterQuantities; at += 3) {
    const [value = null, random = null, systematic = null] = row.slice(at, at + 3);
    const hasBoth = typeof random === 'number' && typeof systematic === 'number';
    cells.push(value, random, systematic, hasBoth ? Math.hypot(random, systematic) : null);
  }
  const [bjd = null, airmass = null, flags = 0] = row.slice(afterQuantities);
  cells.push(bjd, airmass, flagNames(Number(flags)).join(';'));
  cells.push(names.programme, names.solution, names.night);
  return cells;
}

const quantityPlace = 8;
const afterQuantities = quantityPlace + 6 * 3;

/** Written with the digits that its column has; a number without such is a count. */
const written = (cell: Cell, column: number): string => {
  const decimals = calibratedColumns[column]?.decimals ?? null;
  if (typeof cell !== 'number') return '';
  return decimals === null ? String(cell) : cell.toFixed(decimals);
};

/** A line of the table, with its end. Texts are safe in a spreadsheet. */
export const csvRow = (cells: readonly Cell[]): string =>
  `${cells.map((cell, column) => (typeof cell === 'string' ? csvCell(cell) : written(cell, column))).join(',')}\r\n`;

const keys = calibratedColumns.map(({ name }) => JSON.stringify(name));
const flagsPlace = calibratedColumns.findIndex(({ name }) => name === 'flags');

/** An object on a line of its own, without the comma after it. */
export function jsonRow(cells: readonly Cell[]): string {
  const members = cells.map((cell, column) => `${keys[column]}:${jsonValue(cell, column)}`);
  return `{${members.join(',')}}`;
}

function jsonValue(cell: Cell, column: number): string {
  if (cell === null) return 'null';
  if (column === flagsPlace) return JSON.stringify(cell === '' ? [] : String(cell).split(';'));
  return typeof cell === 'string' ? JSON.stringify(cell) : written(cell, column);
}
