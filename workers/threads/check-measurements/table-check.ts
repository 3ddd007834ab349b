import type { Issue } from '@/lib/faults/fault';
import { csvReader } from '@/lib/formats/csv-reader';
import { foreignFileKind } from '@/lib/formats/file-kind';
import { issueList } from '@/lib/formats/issue-list';
import { keptColumns, measurementTable, type MeasurementRow } from '@/lib/formats/measurement-table';
import type { ColumnMapping, MeasurementColumn } from '@/lib/contracts/measurement-columns';
import { magnitudeErrorOfFlux, magnitudeOfFlux } from '@/lib/photometry/instrumental-magnitude';
import { frameRegister } from './frame-register';
import { matchStars } from './match-stars';
import type { CheckOrder, CheckResult } from './messages';
import { numberField, rowFile, textField } from './row-files';
import { starRegister } from './star-register';

/** Rows that are loaded by one statement; between two of them a job can be cancelled. */
const rowsPerSlice = 100_000;
/** As many as a flag's number can count. */
const mostFlags = 65_535;
/** Comments that are kept. [characters]; the original holds them all */
const longestComments = 200_000;

export interface TableCheck {
  readonly push: (bytes: Uint8Array) => void;
  readonly rows: () => number;
  /** After the last bytes: matches the stars and closes the files. */
  readonly finish: (onMatching: () => void) => CheckResult;
}

/** Checks a table from its bytes to the files that are loaded: every row against the rules, the log and the other rows. */
export function tableCheck(order: CheckOrder): TableCheck {
  const issues = issueList();
  const frames = frameRegister(order.frames, order.night);
  const stars = starRegister(order.tolerance);
  const flags = new Map<string, number>();
  const slices = rowFile(order.folder, 'rows', rowsPerSlice);
  let columns: ColumnMapping = {};
  let atStart = true;
  let isForeign = false;

  const table = measurementTable(order.mapping, issues, {
    header: (found) => {
      columns = Object.fromEntries(found);
    },
    row: (row) => checkRow(row),
  });
  const reader = csvReader(table);

  function checkRow(row: MeasurementRow): void {
    const frame = frames.find(row);
    if (typeof frame !== 'number') {
      for (const { column, ...text } of frame) table.report(row.line, column, valueOf(row, column), text);
      return;
    }
    const { exposure_s } = frames.frame(frame);
    const needsExposure = Number.isNaN(row.mag);
    if (needsExposure && !(exposure_s > 0)) {
      const message = 'The frame has no exposure time, so its counts have no magnitude.';
      table.report(row.line, 'flux', String(row.flux), { message, remedy: 'Enter the exposure of the frame in the log.' });
      return;
    }
    const entered = stars.enter({ line: row.line, frame, name: nameOf(row), ra: row.ra, dec: row.dec });
    if ('firstLine' in entered) {
      const message = `This star was measured on this frame in line ${entered.firstLine} already.`;
      const column = row.star === '' ? 'ra' : 'star';
      table.report(row.line, column, valueOf(row, column), { message, remedy: 'Leave one of the two rows out.' });
      return;
    }
    const flag = flagNumber(row);
    if (issues.total() > 0) return; // nothing will be loaded: only faults are still looked for
    const mag = needsExposure ? magnitudeOfFlux(row.flux, exposure_s) : row.mag;
    const err = Number.isNaN(row.err) ? magnitudeErrorOfFlux(row.flux, row.fluxErr) : row.err;
    slices.write(rowLine(row, { frame: frameField(frame), star: entered.star, mag, err, flag }));
  }

  /** Ids of logged frames; −1, −2, … for those that are to be created. */
  const frameField = (frame: number): number => frames.frame(frame).id ?? order.frames.length - frame - 1;

  function flagNumber(row: MeasurementRow): number {
    if (row.flag === '') return NaN;
    const known = flags.get(row.flag);
    if (known !== undefined) return known;
    if (flags.size === mostFlags) {
      const message = `The table has more than ${mostFlags} different flags.`;
      table.report(row.line, 'flag', row.flag, { message, remedy: 'Leave the column out, or map another one.' });
      return NaN;
    }
    flags.set(Buffer.from(row.flag, 'utf8').toString('utf8'), flags.size + 1);
    return flags.size;
  }

  function push(bytes: Uint8Array): void {
    if (isForeign) return;
    const foreign = atStart ? foreignFileKind(bytes) : null;
    atStart = false;
    if (foreign === null) {
      reader.push(bytes);
      return;
    }
    isForeign = true;
    issues.add({
      path: '',
      line: 1,
      message: `This is ${foreign}, not a table of comma-separated values.`,
      remedy: 'Save the table as CSV in UTF-8 and upload that file.',
    });
  }

  function finish(onMatching: () => void): CheckResult {
    if (!isForeign) reader.end();
    table.finish();
    const written = slices.close();
    const found = {
      rows: table.rows(),
      comments: table.comments().join('\n').slice(0, longestComments),
      columns,
      faults: inOrder(issues.kept()),
      nFaults: issues.total(),
    };
    if (issues.total() > 0) return { ...found, load: null };
    onMatching();
    const flagFile = rowFile(order.folder, 'flags');
    for (const [text, number] of flags) flagFile.write(`${number}\t${textField(text)}`);
    const matched = matchStars(order, stars, frames.frames());
    return { ...found, load: { ...matched, slices: written, flags: oneFile(flagFile.close()) } };
  }

  return { push, rows: table.rows, finish };
}

/** A dash alone is how some programs write “no name”. */
const nameOf = ({ star }: MeasurementRow): string => (/^[\s-]*$/.test(star) ? '' : star);

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
  readonly star: number;
  readonly mag: number;
  readonly err: number;
  readonly flag: number;
}

/** row_no, frame, star_no, inst_mag, inst_err, ra, decl, x, y, fwhm, sky, peak, flag_no */
function rowLine(row: MeasurementRow, { frame, star, mag, err, flag }: RowValues): string {
  let line = `${row.rowNo}\t${frame}\t${star + 1}\t${mag}\t${err}\t${numberField(row.ra)}\t${numberField(row.dec)}`;
  for (const column of keptColumns) line += '\t' + (row.kept[column] || '\\N');
  return `${line}\t${numberField(flag)}`;
}

/** By line: a fault of the header or of a whole row may have been found later than those of its fields. */
const inOrder = (faults: readonly Issue[]): readonly Issue[] =>
  faults.map((fault, index) => ({ fault, index })).sort((a, b) => (a.fault.line ?? 0) - (b.fault.line ?? 0) || a.index - b.index).map(({ fault }) => fault);

export const oneFile = (files: readonly { readonly file: string; readonly rows: number }[]) =>
  files[0] ?? { file: '', rows: 0 };
