import { headersKey, type ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { Issue } from '@/lib/faults/fault';
import { csvReader } from '@/lib/formats/csv-reader';
import { foreignFileKind } from '@/lib/formats/file-kind';
import { issueList } from '@/lib/formats/issue-list';
import { measurementTable } from '@/lib/formats/measurement-table';
import { frameRegister } from './frame-register';
import { matchStars } from './match-stars';
import type { CheckResult, Slice } from '@/lib/contracts/measurement-check';
import type { CheckOrder } from './messages';
import { rowCheck } from './row-check';
import { rowFile, textField } from '../row-files';
import { starRegister } from './star-register';

/** Comments that are kept. [characters]; the original holds them all */
const longestComments = 200_000;

export interface TableCheck {
  readonly push: (bytes: Uint8Array) => void;
  readonly rows: () => number;
  /** After the last bytes: matches the stars and closes the files. */
  readonly finish: (onMatching: () => void) => CheckResult;
}

/**
 * Checks a table from its bytes to the files that are loaded: every row against the rules, the log and the other rows.
 * Slices of rows are handed over as they fill, so that loading goes on meanwhile; those that name frames which are yet
 * to be created wait for the end.
 */
export function tableCheck(order: CheckOrder, onSlice: (slice: Slice) => void): TableCheck {
  const issues = issueList();
  const frames = frameRegister(order.frames, order.night);
  const stars = starRegister(order.tolerance);
  const waiting: Slice[] = [];
  const slices = rowFile(order.folder, 'rows', (slice) => {
    if (issues.total() > 0) return;
    if (frames.frames().length > order.frames.length) waiting.push(slice);
    else onSlice(slice);
  });
  let columns: ColumnMapping = {};
  let atStart = true;
  let isForeign = false;

  const table = measurementTable((headers) => mappingOf(order, headers), issues, {
    header: (found) => {
      columns = Object.fromEntries(found);
    },
    row: (row, isFaulty) => rows.check(row, isFaulty),
  });
  const rows = rowCheck({
    frames,
    stars,
    nLogged: order.frames.length,
    report: table.report,
    issues,
    slices,
  });
  const reader = csvReader(table);

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
    slices.close();
    const found = {
      rows: table.rows(),
      comments: table.comments().join('\n').slice(0, longestComments),
      columns,
      faults: inOrder(issues.kept()),
      nFaults: issues.total(),
    };
    if (issues.total() > 0) return { ...found, load: null };
    onMatching();
    const flags: Slice[] = [];
    const flagFile = rowFile(order.folder, 'flags', (slice) => flags.push(slice));
    for (const [text, number] of rows.flags()) flagFile.write(`${number}\t${textField(text)}`);
    flagFile.close();
    return { ...found, load: { ...matchStars(order, stars, frames.frames()), slices: waiting, flags } };
  }

  return { push, rows: table.rows, finish };
}

/** What the uploader said counts; failing that, what somebody said once of a table with the same headers. */
function mappingOf(order: CheckOrder, headers: readonly string[]): ColumnMapping {
  if (Object.keys(order.mapping).length > 0) return order.mapping;
  const wanted = headersKey(headers);
  return order.remembered.find((one) => headersKey(one.headers) === wanted)?.mapping ?? {};
}

/** By line: a fault of a whole row may have been found later than those of the next row's fields. */
const inOrder = (faults: readonly Issue[]): readonly Issue[] =>
  [...faults].sort((a, b) => (a.line ?? 0) - (b.line ?? 0));
