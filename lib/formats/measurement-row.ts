import { bands, frameTypes, type Band, type FrameType } from '@/lib/contracts/bands';
import { measurementColumnNames, type MeasurementColumn } from '@/lib/contracts/measurement-columns';
import type { IssueText } from './issue-list';
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
  /** Whether what the row says of its exposure can be relied on. */
  isExposureReadable: boolean;
  /** Whether ra and dec stand in the file as decimal degrees. */
  isPlaceDecimal: boolean;
  /** The fields as they stand in the file, without blanks around them; '' for a column that is not there. */
  readonly texts: RowTexts;
}
export type RowTexts = Record<MeasurementColumn, string>;
/** Where each column stands among the fields; −1 for nowhere. */
export type ColumnPlaces = Readonly<Record<MeasurementColumn, number>>;

const eachColumn = <T extends string | number>(value: T): Record<MeasurementColumn, T> =>
  Object.fromEntries(measurementColumnNames.map((name) => [name, value])) as Record<MeasurementColumn, T>;
export const columnPlaces = (positions: ReadonlyMap<MeasurementColumn, number>): ColumnPlaces =>
  Object.assign(eachColumn(-1), Object.fromEntries(positions));

/** Longest texts that the database keeps. [characters] */
const longest = { frame: 255, star: 80, flag: 120 } as const;
/** Beyond this a magnitude is a code for “not measured”, such as 99.999. [mag]; common practice, no source */
const largestMagnitude = 50;
/** From here on an error is a code for “not measured”, such as 9.999. [mag]; common practice, no source */
const largestError = 9;

export function emptyRow(): MeasurementRow {
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
    isExposureReadable: true,
    isPlaceDecimal: true,
    texts: eachColumn(''),
  };
}

type Report = (column: MeasurementColumn, text: IssueText) => void;

/** Takes the fields of a row. Written out column by column: a loop over names costs a third of the whole reading. */
export function takeTexts(texts: RowTexts, fields: readonly string[], at: ColumnPlaces): void {
  texts.frame = cell(fields, at.frame);
  texts.star = cell(fields, at.star);
  texts.ra = cell(fields, at.ra);
  texts.dec = cell(fields, at.dec);
  texts.inst_mag = cell(fields, at.inst_mag);
  texts.inst_err = cell(fields, at.inst_err);
  texts.flux = cell(fields, at.flux);
  texts.flux_err = cell(fields, at.flux_err);
  texts.x = cell(fields, at.x);
  texts.y = cell(fields, at.y);
  texts.fwhm = cell(fields, at.fwhm);
  texts.sky = cell(fields, at.sky);
  texts.peak = cell(fields, at.peak);
  texts.flag = cell(fields, at.flag);
  texts.utc_start = cell(fields, at.utc_start);
  texts.exposure = cell(fields, at.exposure);
  texts.band = cell(fields, at.band);
  texts.type = cell(fields, at.type);
}

const cell = (fields: readonly string[], at: number): string => (at < 0 ? '' : (fields[at]?.trim() ?? ''));

/** Reads one row from its texts; everything wrong with it is reported. */
export function fillRow(row: MeasurementRow, report: Report): void {
  const { texts } = row;
  row.frame = readText('frame', texts.frame, report);
  row.star = isNoName(texts.star) ? '' : readText('star', texts.star, report);
  row.flag = readText('flag', texts.flag, report);
  if (row.frame === '') report('frame', missing('the frame’s number or file name'));
  readPlace(row, report);
  readBrightness(row, report);
  readNumber('x', texts.x, report, largestKept);
  readNumber('y', texts.y, report, largestKept);
  readNumber('fwhm', texts.fwhm, report, largestKept);
  readNumber('sky', texts.sky, report, largestKept);
  readNumber('peak', texts.peak, report, largestKept);
  readExposure(row, report);
}

/** Numbers that are only kept have single precision in the database. */
const largestKept = 1e30;

/** A dash alone is how some programs write “no name”. */
const isNoName = (star: string): boolean => star.length < 4 && /^[\s\p{Pd}\u2212]*$/u.test(star);

const missing = (what: string): IssueText => ({
  message: 'There is no value here.',
  remedy: `Write ${what}.`,
});

function readText(column: 'frame' | 'star' | 'flag', value: string, report: Report): string {
  if (value === '') return value;
  if (value.length > longest[column]) {
    const message = `This text has ${value.length} characters; at most ${longest[column]} can be kept.`;
    report(column, { message, remedy: 'Shorten it.' });
  }
  if (/[\u0000-\u001f\u007f\u2028\u2029]/.test(value)) {
    report(column, {
      message: 'This text holds a line break or another control character.',
      remedy: 'Remove it.',
    });
  }
  return value;
}

/** A finite number; NaN when there is none or when it was reported. */
function readNumber(
  column: MeasurementColumn,
  value: string,
  report: Report,
  limit = Number.MAX_VALUE,
): number {
  if (value === '') return NaN;
  const number = numberOf(value);
  if (number === null) {
    const message = /^[+-]?(nan|inf(inity)?)$/i.test(value)
      ? 'This is not a finite number.'
      : 'This is not a number.';
    report(column, {
      message,
      remedy: 'Write a decimal number with a point, or leave the field empty where it may be.',
    });
    return NaN;
  }
  if (Math.abs(number) <= limit) return number;
  report(column, {
    message: `This number is beyond ±${limit}.`,
    remedy: 'Leave the field empty where there is no value.',
  });
  return NaN;
}

function readPlace(row: MeasurementRow, report: Report): void {
  const { ra, dec } = row.texts;
  row.isPlaceDecimal = true;
  row.ra = ra === '' ? NaN : readAngle(row, 'ra', report);
  row.dec = dec === '' ? NaN : readAngle(row, 'dec', report);
  if (ra === '' && dec !== '') report('ra', missing('the right ascension that belongs to the declination'));
  if (dec === '' && ra !== '') report('dec', missing('the declination that belongs to the right ascension'));
  if (row.star === '' && ra === '' && dec === '')
    report('star', missing('the star’s name, or its ra and dec'));
}

/** Nearly every table has decimal degrees; the full reading is for the rest and for saying what is wrong. */
function readAngle(row: MeasurementRow, column: 'ra' | 'dec', report: Report): number {
  const decimal = numberOf(row.texts[column]);
  if (decimal !== null && (column === 'ra' ? decimal >= 0 && decimal < 360 : Math.abs(decimal) <= 90)) {
    return decimal;
  }
  row.isPlaceDecimal = false;
  const angle = angleOf(column, row.texts[column]);
  if (typeof angle === 'number') return angle;
  report(column, angle);
  return NaN;
}

function readBrightness(row: MeasurementRow, report: Report): void {
  const { inst_mag: mag, inst_err: err, flux, flux_err: fluxErr } = row.texts;
  row.mag = readNumber('inst_mag', mag, report);
  row.err = readNumber('inst_err', err, report);
  row.flux = readNumber('flux', flux, report);
  row.fluxErr = readNumber('flux_err', fluxErr, report);
  if (Math.abs(row.mag) > largestMagnitude) {
    report('inst_mag', { message: `No magnitude lies beyond ±${largestMagnitude}.`, remedy: notMeasured });
  }
  if (row.err <= 0)
    report('inst_err', { message: 'A standard error is greater than 0.', remedy: notMeasured });
  if (row.err >= largestError) {
    report('inst_err', {
      message: `A standard error of ${largestError} mag or more says nothing.`,
      remedy: notMeasured,
    });
  }
  if (row.fluxErr <= 0)
    report('flux_err', { message: 'A standard error is greater than 0.', remedy: notMeasured });
  const needsFlux = mag === '' || err === '';
  if (row.flux <= 0 && needsFlux) {
    report('flux', { message: 'Counts of 0 or less have no magnitude.', remedy: notMeasured });
  }
  if (mag === '' && flux === '')
    report('inst_mag', missing('the instrumental magnitude, or the counts in flux'));
  if (err !== '' || (fluxErr !== '' && (flux !== '' || mag === ''))) return;
  if (mag === '' && flux !== '') report('flux_err', missing('the standard error of the counts'));
  else report('inst_err', missing('the standard error of the magnitude'));
}
const notMeasured = 'Leave the row out where the star was not measured.';

function readExposure(row: MeasurementRow, report: Report): void {
  const { utc_start: start, exposure, band, type } = row.texts;
  row.isExposureReadable = true;
  row.utcStart = NaN;
  row.exposure_s = NaN;
  row.band = '';
  row.type = '';
  // Most tables say nothing of exposures, and then there is nothing to make a function for.
  if (start === '' && exposure === '' && band === '' && type === '') return;
  readExposureTexts(row, (column, issue) => {
    row.isExposureReadable = false;
    report(column, issue);
  });
}

function readExposureTexts(row: MeasurementRow, report: Report): void {
  const { utc_start: start, exposure, band } = row.texts;
  const type = row.texts.type.toLowerCase();
  row.utcStart = start === '' ? NaN : instantOf(start);
  if (start !== '' && Number.isNaN(row.utcStart)) {
    report('utc_start', {
      message: 'This is not an instant.',
      remedy: 'Write it in UTC as 2026-11-03T23:41:05Z.',
    });
  }
  row.exposure_s = readNumber('exposure', exposure, report);
  if (row.exposure_s < 0 || row.exposure_s > 86_400) {
    report('exposure', {
      message: 'No exposure takes so long.',
      remedy: 'Write it in seconds, from 0 to 86400.',
    });
  }
  row.band = isOneOf(bands, band) ? band : '';
  if (band !== '' && row.band === '') {
    report('band', {
      message: 'This is no band of the standard system.',
      remedy: `Write ${bands.join(', ')}.`,
    });
  }
  row.type = isOneOf(frameTypes, type) ? type : '';
  if (type !== '' && row.type === '') {
    report('type', { message: 'This is no type of frame.', remedy: 'Write standard or target.' });
  }
}

const isOneOf = <T extends string>(list: readonly T[], text: string): text is T =>
  (list as readonly string[]).includes(text);
