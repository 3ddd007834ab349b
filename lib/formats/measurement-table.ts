import { bands, frameTypes, type Band, type FrameType } from '@/lib/contracts/bands';
import {
  columnPositions,
  headerKey,
  measurementColumnNames,
  missingColumns,
  type ColumnMapping,
  type MeasurementColumn,
} from '@/lib/contracts/measurement-columns';
import type { CsvFault, CsvSink } from './csv-reader';
import { excerpt, type IssueList } from './issue-list';
import { angleOf, instantOf, numberOf } from './measurement-values';

/** One row of a measurement table, understood. The object is used again for the next row: copy what you keep. NaN and '' mean absent. */
export interface MeasurementRow {
  /** Data row, from 1. */
  rowNo: number;
  line: number;
  frame: string;
  star: string;
  /** J2000. [deg] */
  ra: number;
  dec: number;
  mag: number;
  err: number;
  flux: number;
  fluxErr: number;
  flag: string;
  /** [ms since 1970-01-01T00:00:00Z] */
  utcStart: number;
  exposure_s: number;
  band: Band | '';
  type: FrameType | '';
  /** Values of the columns that are only kept, as decimal numbers in text; '' for absent. */
  readonly kept: Record<KeptColumn, string>;
}
export const keptColumns = ['x', 'y', 'fwhm', 'sky', 'peak'] as const;
export type KeptColumn = (typeof keptColumns)[number];

export interface TableSink {
  /** The header was understood: which header stands for which column. */
  readonly header?: (columns: ReadonlyMap<MeasurementColumn, string>) => void;
  /** A row without a fault of its own. */
  readonly row: (row: MeasurementRow) => void;
}

export interface MeasurementTable extends CsvSink {
  /** Call once after the last row: a table without header or rows is a fault too. */
  readonly finish: () => void;
  readonly comments: () => readonly string[];
  /** Rows after the header, faulty ones included. */
  readonly rows: () => number;
  /** Adds an issue about one column of a row, in the file's own spelling of the column. */
  readonly report: (line: number, column: MeasurementColumn, value: string, text: IssueText) => void;
}
export interface IssueText {
  readonly message: string;
  readonly remedy: string;
}

/** Longest texts that the database keeps. [characters] */
const longest = { frame: 255, star: 80, flag: 120 } as const;
/** Beyond this a magnitude is a code for “not measured”, such as 99.999. [mag]; common practice, no source */
const largestMagnitude = 50;
/** From here on an error is a code for “not measured”, such as 9.999. [mag]; common practice, no source */
const largestError = 9;

/** The rules of a measurement table: takes rows of text, gives rows of values and reports everything wrong with them. */
export function measurementTable(mapping: ColumnMapping, issues: IssueList, sink: TableSink): MeasurementTable {
  const comments: string[] = [];
  let headers: readonly string[] | null = null;
  let positions: ReadonlyMap<MeasurementColumn, number> = new Map();
  let usable = false;
  let rows = 0;
  const row = emptyRow();
  let current: readonly string[] = [];

  // One closure for all rows: a million of them would keep the collector busy.
  const text = (column: MeasurementColumn): string => {
    const position = positions.get(column);
    return position === undefined ? '' : (current[position]?.trim() ?? '');
  };
  const reportHere = (column: MeasurementColumn, issue: IssueText): void => {
    report(row.line, column, text(column), issue);
  };
  const headerOf = (column: MeasurementColumn): string => headers?.[positions.get(column) ?? -1]?.trim() ?? column;
  function report(line: number, column: MeasurementColumn, value: string, text: IssueText): void {
    issues.add({ path: column, line, column: headerOf(column), value: excerpt(value), ...text });
  }

  function readHeader(fields: readonly string[], line: number): void {
    headers = fields;
    positions = columnPositions(fields, mapping);
    const found = headerIssues(fields, mapping, positions);
    found.forEach((issue) => issues.add({ path: '', line, ...issue }));
    usable = found.length === 0;
    if (usable) sink.header?.(new Map([...positions.keys()].map((column) => [column, headerOf(column)])));
  }

  function readRow(fields: readonly string[], line: number): void {
    rows += 1;
    if (!usable || headers === null) return;
    if (fields.length !== headers.length) {
      issues.add({ path: '', line, value: excerpt(fields.join(',')), ...fieldCountText(fields, headers.length) });
      return;
    }
    const before = issues.total();
    row.rowNo = rows;
    row.line = line;
    current = fields;
    fillRow(row, text, reportHere);
    if (issues.total() === before) sink.row(row);
  }

  return {
    comment: (text) => comments.push(text),
    row: (fields, line) => {
      if (headers === null) readHeader(fields, line);
      else readRow(fields, line);
    },
    fault: (fault) => {
      if (headers !== null) rows += 1;
      issues.add(issueOf(fault, headers));
    },
    finish: () => {
      if (issues.total() > 0) return;
      if (headers === null) {
        issues.add({ path: '', message: 'The table is empty: it has no header line.', remedy: emptyRemedy });
      } else if (rows === 0) {
        issues.add({ path: '', message: 'The table has a header and no rows.', remedy: emptyRemedy });
      }
    },
    comments: () => comments,
    rows: () => rows,
    report,
  };
}

const emptyRemedy = 'Upload the file that your reduction wrote.';

function emptyRow(): MeasurementRow {
  return {
    rowNo: 0,
    line: 0,
    frame: '',
    star: '',
    ra: NaN,
    dec: NaN,
    mag: NaN,
    err: NaN,
    flux: NaN,
    fluxErr: NaN,
    flag: '',
    utcStart: NaN,
    exposure_s: NaN,
    band: '',
    type: '',
    kept: { x: '', y: '', fwhm: '', sky: '', peak: '' },
  };
}

function issueOf({ field, ...fault }: CsvFault, headers: readonly string[] | null) {
  const header = field === undefined ? undefined : headers?.[field]?.trim();
  return { path: '', ...fault, ...(header === undefined ? {} : { column: header }) };
}

function fieldCountText(fields: readonly string[], expected: number): IssueText {
  const message = `This row has ${fields.length} ${fields.length === 1 ? 'field' : 'fields'}, the header ${expected}.`;
  if (fields[0]?.startsWith('#')) return { message, remedy: 'Comments can only stand before the header.' };
  return fields.length > expected
    ? { message, remedy: 'A text with a comma in it stands between quotation marks; decimals take a point.' }
    : { message, remedy: 'Leave a field that has no value empty, but keep its comma.' };
}

function headerIssues(
  headers: readonly string[],
  mapping: ColumnMapping,
  positions: ReadonlyMap<MeasurementColumn, number>,
): (IssueText & { column?: string; value?: string })[] {
  const found: (IssueText & { column?: string; value?: string })[] = [];
  const joined = excerpt(headers.join(','));
  const other = headers.length === 1 ? /[;\t|]/.exec(headers[0] ?? '')?.[0] : undefined;
  if (other !== undefined) {
    const name = other === ';' ? 'semicolons' : other === '\t' ? 'tabs' : 'bars';
    return [
      { value: joined, message: `The fields are separated by ${name}.`, remedy: 'Save the table with commas between the fields.' },
    ];
  }
  const seen = new Set<string>();
  for (const header of headers) {
    const key = headerKey(header);
    if (key !== '' && seen.has(key)) {
      const message = `Two columns are called ${header.trim()}.`;
      found.push({ column: header.trim(), value: joined, message, remedy: 'Give every column a name of its own.' });
    }
    seen.add(key);
  }
  for (const column of measurementColumnNames) {
    const mapped = mapping[column];
    if (mapped === undefined || seen.has(headerKey(mapped))) continue;
    const message = `The column ${column} is to be read from ${mapped}, which this file does not have.`;
    found.push({ column: mapped, value: joined, message, remedy: 'Choose another column for it.' });
  }
  for (const { message, anyOf } of missingColumns(positions)) {
    const wanted = anyOf.map((columns) => columns.join(' and ')).join(', or ');
    const remedy = `Name it ${wanted}, or say on the upload page which column it is.`;
    found.push({ value: joined, message, remedy });
  }
  return found;
}

type Report = (column: MeasurementColumn, text: IssueText) => void;
type Text = (column: MeasurementColumn) => string;

function fillRow(row: MeasurementRow, text: Text, report: Report): void {
  row.frame = readText('frame', text, report);
  row.star = readText('star', text, report);
  row.flag = readText('flag', text, report);
  if (row.frame === '') report('frame', missing('the frame’s number or file name'));
  readPlace(row, text, report);
  readBrightness(row, text, report);
  for (const column of keptColumns) {
    const value = text(column);
    row.kept[column] = value;
    if (value !== '') readNumber(column, value, report, 1e30);
  }
  readExposure(row, text, report);
}

const missing = (what: string): IssueText => ({ message: 'There is no value here.', remedy: `Write ${what}.` });

function readText(column: 'frame' | 'star' | 'flag', text: Text, report: Report): string {
  const value = text(column);
  if (value.length > longest[column]) {
    const message = `This text has ${value.length} characters; at most ${longest[column]} can be kept.`;
    report(column, { message, remedy: 'Shorten it.' });
  }
  // eslint-disable-next-line no-control-regex -- looks for control characters on purpose
  if (/[\u0000-\u001f\u007f\u2028\u2029]/.test(value)) {
    report(column, { message: 'This text holds a line break or another control character.', remedy: 'Remove it.' });
  }
  return value;
}

/** A finite number; NaN when there is none or when it was reported. */
function readNumber(column: MeasurementColumn, value: string, report: Report, limit = Number.MAX_VALUE): number {
  if (value === '') return NaN;
  const number = numberOf(value);
  if (number === null) {
    const message = /^[+-]?(nan|inf(inity)?)$/i.test(value) ? 'This is not a finite number.' : 'This is not a number.';
    report(column, { message, remedy: 'Write a decimal number with a point, or leave the field empty where it may be.' });
    return NaN;
  }
  if (Math.abs(number) <= limit) return number;
  report(column, { message: `This number is beyond ±${limit}.`, remedy: 'Leave the field empty where there is no value.' });
  return NaN;
}

function readPlace(row: MeasurementRow, text: Text, report: Report): void {
  const ra = text('ra');
  const dec = text('dec');
  row.ra = ra === '' ? NaN : readAngle('ra', ra, report);
  row.dec = dec === '' ? NaN : readAngle('dec', dec, report);
  if (ra === '' && dec !== '') report('ra', missing('the right ascension that belongs to the declination'));
  if (dec === '' && ra !== '') report('dec', missing('the declination that belongs to the right ascension'));
  if (row.star === '' && ra === '' && dec === '') report('star', missing('the star’s name, or its ra and dec'));
}

function readAngle(column: 'ra' | 'dec', value: string, report: Report): number {
  const angle = angleOf(column, value);
  if (typeof angle === 'number') return angle;
  report(column, angle);
  return NaN;
}

function readBrightness(row: MeasurementRow, text: Text, report: Report): void {
  const [mag, err, flux, fluxErr] = [text('inst_mag'), text('inst_err'), text('flux'), text('flux_err')];
  row.mag = readNumber('inst_mag', mag, report);
  row.err = readNumber('inst_err', err, report);
  row.flux = readNumber('flux', flux, report);
  row.fluxErr = readNumber('flux_err', fluxErr, report);
  if (Math.abs(row.mag) > largestMagnitude) {
    report('inst_mag', { message: `No magnitude lies beyond ±${largestMagnitude}.`, remedy: notMeasured });
  }
  if (row.err <= 0) report('inst_err', { message: 'A standard error is greater than 0.', remedy: notMeasured });
  if (row.err >= largestError) {
    report('inst_err', { message: `A standard error of ${largestError} mag or more says nothing.`, remedy: notMeasured });
  }
  if (row.fluxErr <= 0) report('flux_err', { message: 'A standard error is greater than 0.', remedy: notMeasured });
  const needsFlux = mag === '' || err === '';
  if (row.flux <= 0 && needsFlux) {
    report('flux', { message: 'Counts of 0 or less have no magnitude.', remedy: notMeasured });
  }
  if (mag === '' && flux === '') report('inst_mag', missing('the instrumental magnitude, or the counts in flux'));
  else if (err === '' && (fluxErr === '' || flux === '')) {
    if (mag === '') report('flux_err', missing('the standard error of the counts'));
    else report('inst_err', missing('the standard error of the magnitude'));
  }
}
const notMeasured = 'Leave the row out where the star was not measured.';

function readExposure(row: MeasurementRow, text: Text, report: Report): void {
  const [start, exposure, band, type] = [text('utc_start'), text('exposure'), text('band'), text('type').toLowerCase()];
  row.utcStart = start === '' ? NaN : instantOf(start);
  if (start !== '' && Number.isNaN(row.utcStart)) {
    report('utc_start', { message: 'This is not an instant.', remedy: 'Write it in UTC as 2026-11-03T23:41:05Z.' });
  }
  row.exposure_s = readNumber('exposure', exposure, report);
  if (row.exposure_s < 0 || row.exposure_s > 86_400) {
    report('exposure', { message: 'No exposure takes so long.', remedy: 'Write it in seconds, from 0 to 86400.' });
  }
  row.band = isOneOf(bands, band) ? band : '';
  if (band !== '' && row.band === '') {
    report('band', { message: 'This is no band of the standard system.', remedy: `Write ${bands.join(', ')}.` });
  }
  row.type = isOneOf(frameTypes, type) ? type : '';
  if (type !== '' && row.type === '') {
    report('type', { message: 'This is no type of frame.', remedy: 'Write standard or target.' });
  }
}

const isOneOf = <T extends string>(list: readonly T[], text: string): text is T =>
  (list as readonly string[]).includes(text);
