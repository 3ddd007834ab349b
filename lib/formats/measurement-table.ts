import {
  columnPositions,
  type ColumnMapping,
  type MeasurementColumn,
} from '@/lib/contracts/measurement-columns';
import type { CsvFault, CsvSink } from './csv-reader';
import { excerpt, type IssueList, type IssueText } from './issue-list';
import { fieldCountText, headerIssues } from './measurement-header';
import { columnPlaces, emptyRow, fillRow, takeTexts, type MeasurementRow } from './measurement-row';

/** Which header stands for which column, once the headers are known. */
export type MappingFor = (headers: readonly string[]) => ColumnMapping;

export interface TableSink {
  /** The header was understood: which header stands for which column. */
  readonly header?: (columns: ReadonlyMap<MeasurementColumn, string>) => void;
  /** A row that could be read; `isFaulty` when something in it has been reported already. */
  readonly row: (row: MeasurementRow, isFaulty: boolean) => void;
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
/** The rules of a measurement table: takes rows of text, gives rows of values and reports everything wrong with them. */
export function measurementTable(
  mappingFor: MappingFor,
  issues: IssueList,
  sink: TableSink,
): MeasurementTable {
  const comments: string[] = [];
  let headers: readonly string[] | null = null;
  let positions: ReadonlyMap<MeasurementColumn, number> = new Map();
  let usable = false;
  let rows = 0;
  let places = columnPlaces(positions);
  const row = emptyRow();

  // One closure for all rows: a million of them would keep the collector busy.
  const reportHere = (column: MeasurementColumn, issue: IssueText): void => {
    report(row.line, column, row.texts[column], issue);
  };
  const headerOf = (column: MeasurementColumn): string =>
    headers?.[positions.get(column) ?? -1]?.trim() ?? column;
  function report(line: number, column: MeasurementColumn, value: string, text: IssueText): void {
    issues.add({ path: column, line, column: headerOf(column), value: excerpt(value), ...text });
  }

  function readHeader(fields: readonly string[], line: number): void {
    headers = fields;
    const mapping = mappingFor(fields);
    positions = columnPositions(fields, mapping);
    places = columnPlaces(positions);
    const found = headerIssues(fields, mapping, positions);
    found.forEach((issue) => issues.add({ path: '', line, ...issue }));
    usable = found.length === 0;
    if (usable) sink.header?.(new Map([...positions.keys()].map((column) => [column, headerOf(column)])));
  }

  function readRow(fields: readonly string[], line: number): void {
    rows += 1;
    if (!usable || headers === null) return;
    if (fields.length !== headers.length) {
      issues.add({
        path: '',
        line,
        value: excerpt(fields.join(',')),
        ...fieldCountText(fields, headers.length),
      });
      return;
    }
    const before = issues.total();
    row.rowNo = rows;
    row.line = line;
    takeTexts(row.texts, fields, places);
    fillRow(row, reportHere);
    sink.row(row, issues.total() > before);
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

function issueOf({ field, ...fault }: CsvFault, headers: readonly string[] | null) {
  const header = field === undefined ? undefined : headers?.[field]?.trim();
  return { path: '', ...fault, ...(header === undefined ? {} : { column: header }) };
}
