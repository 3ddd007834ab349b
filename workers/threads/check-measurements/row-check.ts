import type { MeasurementColumn } from '@/lib/contracts/measurement-columns';
import type { IssueList } from '@/lib/formats/issue-list';
import type { MeasurementRow } from '@/lib/formats/measurement-row';
import type { MeasurementTable } from '@/lib/formats/measurement-table';
import { magnitudeErrorOfFlux, magnitudeOfFlux } from '@/lib/photometry/instrumental-magnitude';
import { frameField, type FrameRegister } from './frame-register';
import { numberField, type RowFile } from '../row-files';
import type { StarRegister } from './star-register';

export interface RowCheck {
  /** A row with faults of its own is still checked against the log, so that all its faults come at once. */
  readonly check: (row: MeasurementRow, isFaulty: boolean) => void;
  /** Distinct flags and their numbers, from 1. */
  readonly flags: () => ReadonlyMap<string, number>;
}

export interface RowCheckParts {
  readonly frames: FrameRegister;
  readonly stars: StarRegister;
  /** How many of the frames are in the log. */
  readonly nLogged: number;
  readonly report: MeasurementTable['report'];
  readonly issues: IssueList;
  readonly slices: RowFile;
}

/** As many as a flag's number can count. */
const mostFlags = 65_535;

/** Checks a row against the log and the rows before it, and writes it for loading while no row has a fault. */
export function rowCheck({ frames, stars, nLogged, report, issues, slices }: RowCheckParts): RowCheck {
  const flags = new Map<string, number>();

  function check(row: MeasurementRow, isFaulty: boolean): void {
    if (isFaulty && (row.frame === '' || !row.isExposureReadable)) return;
    const frame = frames.find(row);
    if (typeof frame !== 'number') {
      for (const { column, ...text } of frame) report(row.line, column, valueOf(row, column), text);
      return;
    }
    if (isFaulty) return;
    const { id, exposure_s } = frames.frame(frame);
    const needsExposure = Number.isNaN(row.mag);
    if (needsExposure && !(exposure_s > 0)) {
      const message = 'The frame has no exposure time, so its counts have no magnitude.';
      report(row.line, 'flux', String(row.flux), {
        message,
        remedy: 'Enter the exposure of the frame in the log.',
      });
      return;
    }
    const star = starOf(row, frame);
    const flag = flagNumber(row);
    if (star === null || issues.total() > 0) return; // nothing will be loaded: only faults are still looked for
    slices.write(rowLine(row, { frame: frameField(id, frame, nLogged), star, flag, exposure_s }));
  }

  function starOf(row: MeasurementRow, frame: number): number | null {
    const entered = stars.enter({ line: row.line, frame, name: row.star, ra: row.ra, dec: row.dec });
    if ('star' in entered) return entered.star;
    const column = row.star === '' ? 'ra' : 'star';
    const message = `This star was measured on this frame in line ${entered.firstLine} already.`;
    report(row.line, column, valueOf(row, column), { message, remedy: 'Leave one of the two rows out.' });
    return null;
  }

  function flagNumber(row: MeasurementRow): number {
    if (row.flag === '') return NaN;
    const known = flags.get(row.flag);
    if (known !== undefined) return known;
    if (flags.size === mostFlags) {
      const message = `The table has more than ${mostFlags} different flags.`;
      report(row.line, 'flag', row.flag, { message, remedy: 'Leave the column out, or map another one.' });
      return NaN;
    }
    // A part of a longer text keeps all of it in memory; a copy keeps only itself.
    flags.set(Buffer.from(row.flag, 'utf8').toString('utf8'), flags.size + 1);
    return flags.size;
  }

  return { check, flags: () => flags };
}

function valueOf(row: MeasurementRow, column: MeasurementColumn): string {
  switch (column) {
    case 'frame':
    case 'star':
    case 'band':
    case 'type':
      return row[column];
    case 'exposure':
      return String(row.exposure_s);
    case 'utc_start':
      return new Date(row.utcStart).toISOString();
    case 'ra':
      return `${row.ra} ${row.dec}`;
    default:
      return '';
  }
}

interface RowValues {
  readonly frame: number;
  /** From 0. */
  readonly star: number;
  readonly flag: number;
  readonly exposure_s: number;
}

/**
 * row_no, frame, star_no, inst_mag, inst_err, ra, decl, x, y, fwhm, sky, peak, flag_no. A number that was read as a plain
 * decimal goes on as it stands in the file: writing it anew costs time and cannot make it truer.
 */
function rowLine(row: MeasurementRow, { frame, star, flag, exposure_s }: RowValues): string {
  const { texts } = row;
  const mag = texts.inst_mag || String(magnitudeOfFlux(row.flux, exposure_s));
  const err = texts.inst_err || String(magnitudeErrorOfFlux(row.flux, row.fluxErr));
  const ra = row.isPlaceDecimal ? texts.ra || '\\N' : numberField(row.ra);
  const dec = row.isPlaceDecimal ? texts.dec || '\\N' : numberField(row.dec);
  const head = `${row.rowNo}\t${frame}\t${star + 1}\t${mag}\t${err}\t${ra}\t${dec}`;
  const kept = `${texts.x || '\\N'}\t${texts.y || '\\N'}\t${texts.fwhm || '\\N'}\t${texts.sky || '\\N'}\t${texts.peak || '\\N'}`;
  return `${head}\t${kept}\t${Number.isNaN(flag) ? '\\N' : flag}`;
}
