import Papa from 'papaparse';
import type { FrameLine, LineField } from './frame-line';

/** Columns of a pasted table, in the order that a table without a header line has them. */
const columns: readonly LineField[] = [
  'number',
  'type',
  'object',
  'band',
  'start',
  'exposure',
  'comment',
  'file',
  'programme',
  'ra',
  'dec',
  'fwhm',
  'sky',
];

/** Other names that people and programs give the columns. */
const synonyms: Readonly<Record<string, LineField>> = {
  frame: 'number',
  utc_start: 'start',
  utc: 'start',
  'start, utc': 'start',
  filter: 'band',
  exptime: 'exposure',
  'exposure, s': 'exposure',
};

export interface ListedLine {
  /** As an editor counts it, from 1. */
  readonly lineNumber: number;
  readonly line: FrameLine;
}

export interface FrameList {
  readonly lines: readonly ListedLine[];
  /** What is wrong with the table as such. */
  readonly problems: readonly string[];
}

function columnOf(title: string): LineField | null {
  const name = title.trim().toLowerCase();
  return columns.find((column) => column === name) ?? synonyms[name] ?? null;
}

/** The columns of a table: its header's, or ours when its first line is no header. */
function headOf(first: readonly string[]): {
  readonly head: readonly (LineField | null)[];
  readonly hasHeader: boolean;
} {
  const named = first.map(columnOf);
  const hasHeader = named.filter((column) => column !== null).length >= 2;
  return hasHeader ? { head: named, hasHeader } : { head: columns, hasHeader };
}

function lineFrom(cells: readonly string[], head: readonly (LineField | null)[]): FrameLine {
  const line = Object.fromEntries(columns.map((column) => [column, ''])) as Record<LineField, string>;
  for (const [at, column] of head.entries()) if (column !== null) line[column] = (cells[at] ?? '').trim();
  return line;
}

/** Reads a table of frames: comma, semicolon or tab between the columns, with or without a header line. */
export function readFrameList(text: string): FrameList {
  const plain = text.replace(/^\uFEFF/, '');
  if (plain.trim() === '') return { lines: [], problems: [] };
  const { data } = Papa.parse<string[]>(plain, { delimitersToGuess: [',', '\t', ';'] });
  const numbered = data
    .map((cells, index) => ({ cells, lineNumber: index + 1 }))
    .filter(({ cells }) => cells.some((cell) => cell.trim() !== '') && !(cells[0] ?? '').startsWith('#'));
  const { head, hasHeader } = headOf(numbered[0]?.cells ?? []);
  const titles = numbered[0]?.cells ?? [];
  const unknown = hasHeader ? titles.filter((title) => title.trim() !== '' && columnOf(title) === null) : [];
  const problems = unknown.map((title) => `The column “${title.trim()}” is not known, and is left out.`);
  const lines = (hasHeader ? numbered.slice(1) : numbered).map(({ cells, lineNumber }) => ({
    lineNumber,
    line: lineFrom(cells, head),
  }));
  return { lines, problems };
}

/** The same as text, with a header line: what FITS headers say comes to the person in this form, to be looked over. */
export function printFrameList(lines: readonly FrameLine[]): string {
  const used = columns.filter((column) => lines.some((line) => line[column] !== ''));
  return Papa.unparse(
    { fields: [...used], data: lines.map((line) => used.map((column) => line[column])) },
    { newline: '\n' },
  );
}
