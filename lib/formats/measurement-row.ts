import { bands, frameTypes, type Band, type FrameType } from '@/lib/contracts/bands';
import type { MeasurementColumn } from '@/lib/contracts/measurement-columns';
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
  /** Values of the columns that are only kept, as decimal numbers in text; '' for absent. */
  readonly kept: Record<KeptColumn, string>;
}
export const keptColumns = ['x', 'y', 'fwhm', 'sky', 'peak'] as const;
export type KeptColumn = (typeof keptColumns)[number];

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
    kept: { x: '', y: '', fwhm: '', sky: '', peak: '' },
  };
}

type Report = (column: MeasurementColumn, text: IssueText) => void;
type Text = (column: MeasurementColumn) => string;

/** Reads one row; everything wrong with it is reported. */
export function fillRow(row: MeasurementRow, text: Text, report: Report): void {
  row.frame = readText('frame', text, report);
  const star = readText('star', text, report);
  // A dash alone is how some programs write “no name”.
  row.star = /^[\s\p{Pd}\u2212]*$/u.test(star) ? '' : star;
  row.flag = readText('flag', text, report);
  if (row.frame === '') report('frame', missing('the frame’s number or file name'));
  readPlace(row, text, report);
  readBrightness(row, text, report);
  for (const column of keptColumns) {
    const value = text(column);
    row.kept[column] = value;
    if (value !== '') readNumber(column, value, report, 1e30);
  }
  row.isExposureReadable = true;
  readExposure(row, text, (column, issue) => {
    row.isExposureReadable = false;
    report(column, issue);
  });
}

const missing = (what: string): IssueText => ({
  message: 'There is no value here.',
  remedy: `Write ${what}.`,
});

function readText(column: 'frame' | 'star' | 'flag', text: Text, report: Report): string {
  const value = text(column);
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

function readPlace(row: MeasurementRow, text: Text, report: Report): void {
  const ra = text('ra');
  const dec = text('dec');
  row.ra = ra === '' ? NaN : readAngle('ra', ra, report);
  row.dec = dec === '' ? NaN : readAngle('dec', dec, report);
  if (ra === '' && dec !== '') report('ra', missing('the right ascension that belongs to the declination'));
  if (dec === '' && ra !== '') report('dec', missing('the declination that belongs to the right ascension'));
  if (row.star === '' && ra === '' && dec === '')
    report('star', missing('the star’s name, or its ra and dec'));
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

function readExposure(row: MeasurementRow, text: Text, report: Report): void {
  const [start, exposure, band, type] = [
    text('utc_start'),
    text('exposure'),
    text('band'),
    text('type').toLowerCase(),
  ];
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
