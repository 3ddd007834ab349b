import Papa from 'papaparse';
import { excerpt } from './issue-list';
import { utf8Lines, type TextPiece } from './utf8-lines';

/** Something wrong with the text itself, before anything in it is understood. */
export interface CsvFault {
  /** Line as an editor counts it, from 1. */
  readonly line: number;
  /** Which field of the row, from 0, where that can be said. */
  readonly field?: number;
  readonly value?: string;
  readonly message: string;
  readonly remedy: string;
}

export interface CsvSink {
  /** A line before the first row that begins with #, without it. */
  readonly comment: (text: string, line: number) => void;
  /** A row that is not blank; `line` is where it begins. The array is the sink's to keep. */
  readonly row: (fields: readonly string[], line: number) => void;
  readonly fault: (fault: CsvFault) => void;
}

export interface CsvReader {
  /** Takes the next bytes of the file; they may be overwritten afterwards. */
  readonly push: (bytes: Uint8Array) => void;
  readonly end: () => void;
}

/** Longest row: what lies beyond it is an opening quote without its partner, or no text table at all. [characters] */
const longestRow = 1024 * 1024;

/** After so many misplaced quotation marks a file is not read further: each costs a fresh look at the piece. */
const mostQuoteFaults = 200;

/**
 * Reads RFC 4180 from UTF-8 bytes in pieces of any size: byte-order mark, CRLF, quoted line breaks, comments before the
 * first row. Papa Parse splits each piece; this keeps the line numbers, the text that a piece leaves unfinished and the
 * check of the encoding, which that library leaves to its caller.
 */
export function csvReader(sink: CsvSink): CsvReader {
  const lines = utf8Lines();
  let carry = ''; // text of a row that is not complete
  let line = 1; // where `carry` begins
  let beforeRows = true;
  let stopped = false;
  let quoteFaults = 0;
  const wrong = wrongLines(sink);

  const stop = (fault: CsvFault): void => {
    stopped = true;
    sink.fault(fault);
  };

  function push(bytes: Uint8Array): void {
    if (stopped) return;
    const piece = lines.push(bytes);
    if (piece) consume(piece, false);
    else if (lines.pending() > longestRow) stop(tooLong(line));
  }

  function end(): void {
    if (!stopped) consume(lines.end(), true);
  }

  function consume(piece: TextPiece, isLast: boolean): void {
    if (piece.wrongLines.length > 0) wrong.note(piece.wrongLines, line + count(carry, '\n'));
    let text = skipComments(carry + piece.text, isLast);
    for (;;) {
      const { data, errors, cursor } = split(text, isLast);
      // Whatever follows a misplaced quotation mark is guesswork: the rows before it count, then its line is left out.
      const misplaced = errors.find(({ code, row }) => code === 'InvalidQuotes' || row < data.length);
      const start = line;
      emit(misplaced ? data.slice(0, misplaced.row) : data, text.includes('"'));
      if (!misplaced) {
        carry = text.slice(cursor);
        break;
      }
      const feed = text.indexOf('\n', misplaced.index);
      const resume = feed === -1 ? text.length : feed + 1;
      sink.fault(
        quoteFault(misplaced.code, line, text.slice(text.lastIndexOf('\n', misplaced.index - 1) + 1, resume)),
      );
      quoteFaults += 1;
      line = start + count(text.slice(0, resume), '\n');
      text = text.slice(resume);
      if (quoteFaults === mostQuoteFaults) return stop(tooManyQuotes(line));
    }
    if (carry.length > longestRow) stop(tooLong(line));
  }

  function emit(rows: readonly (readonly string[])[], mayBreak: boolean): void {
    for (const fields of rows) {
      const from = line;
      line += 1 + (mayBreak ? breaksWithin(fields) : 0);
      if (wrong.claim(fields, line)) continue;
      if (fields.length === 1 && fields[0]?.trim() === '') continue;
      beforeRows = false;
      sink.row(fields, from);
    }
  }

  /** Takes the blank lines and comments off the start, until the first row. */
  function skipComments(text: string, isLast: boolean): string {
    let from = 0;
    while (beforeRows) {
      const feed = text.indexOf('\n', from);
      if (feed === -1 && !isLast) break;
      const to = feed === -1 ? text.length : feed;
      const content = text.slice(from, to);
      if (!content.startsWith('#') && content.trim() !== '') break;
      if (content.startsWith('#')) sink.comment(content.slice(1).trim(), line);
      wrong.claim([content], line + 1);
      if (feed === -1) return '';
      from = feed + 1;
      line += 1;
    }
    return from === 0 ? text : text.slice(from);
  }

  return { push, end };
}

/** Lines that are not UTF-8, until the row that they belong to comes by. */
function wrongLines(sink: CsvSink) {
  const waiting: number[] = [];
  return {
    note: (lines: readonly number[], first: number): void => {
      for (const line of lines) waiting.push(first + line);
    },
    /** Reports those before the line `until`, as faults of these fields; whether there were any. */
    claim: (fields: readonly string[], until: number): boolean => {
      if (waiting.length === 0) return false;
      const later = waiting.findIndex((line) => line >= until);
      const claimed = waiting.splice(0, later === -1 ? waiting.length : later);
      const field = fields.findIndex((text) => text.includes('\ufffd'));
      const value = fields[field];
      for (const line of claimed) {
        sink.fault({
          line,
          ...(value === undefined ? {} : { field, value: excerpt(value) }),
          message: 'This is not UTF-8 text.',
          remedy: 'Save the table with the encoding UTF-8.',
        });
      }
      return claimed.length > 0;
    },
  };
}

interface Split {
  readonly data: readonly (readonly string[])[];
  /** `row` counts within `data`; `index` is where in the text the field began. */
  readonly errors: readonly { readonly row: number; readonly code: string; readonly index: number }[];
  readonly cursor: number;
}

/** Splits text into rows; unless it is the last, the row that is not complete is left after the cursor. */
function split(text: string, isLast: boolean): Split {
  const parser = new Papa.Parser({ delimiter: ',', newline: '\n' });
  const result = parser.parse(text, 0, !isLast) as Omit<Split, 'cursor'> & { meta: { cursor: number } };
  return { data: result.data, errors: result.errors, cursor: result.meta.cursor };
}

function breaksWithin(fields: readonly string[]): number {
  let breaks = 0;
  for (const field of fields) if (field.includes('\n')) breaks += count(field, '\n');
  return breaks;
}

function count(text: string, character: string): number {
  let found = 0;
  for (let at = text.indexOf(character); at !== -1; at = text.indexOf(character, at + 1)) found += 1;
  return found;
}

const tooLong = (line: number): CsvFault => ({
  line,
  message:
    'The row that begins here does not end within 1,048,576 characters. The table was not read further.',
  remedy: 'Look for a quotation mark without its partner.',
});

const tooManyQuotes = (line: number): CsvFault => ({
  line,
  message: `${mostQuoteFaults} rows have misplaced quotation marks. The table was not read further.`,
  remedy:
    'Write a field with commas, quotation marks or line breaks between quotation marks, those inside twice.',
});

function quoteFault(code: string, line: number, row: string): CsvFault {
  const value = excerpt(row.trimEnd());
  return code === 'MissingQuotes'
    ? {
        line,
        value,
        message: 'A quotation mark that opens in this row is never closed.',
        remedy: 'Close it, or remove it.',
      }
    : {
        line,
        value,
        message: 'A quoted field goes on after its closing quotation mark.',
        remedy: 'Write a quotation mark inside a quoted field twice.',
      };
}
