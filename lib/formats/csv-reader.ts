import { isAscii, isUtf8 } from 'node:buffer';
import Papa from 'papaparse';
import { excerpt } from './issue-list';

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
  let pending = Buffer.alloc(0); // bytes after the last line feed
  let carry = ''; // text of a row that is not complete
  let line = 1; // where `carry` begins
  let atStart = true;
  let beforeRows = true;
  let stopped = false;
  let quoteFaults = 0;
  const wronglyEncoded: number[] = []; // lines, ascending, that no row has claimed yet

  const stop = (fault: CsvFault): void => {
    stopped = true;
    sink.fault(fault);
  };

  function push(bytes: Uint8Array): void {
    if (stopped) return;
    const end = bytes.lastIndexOf(10) + 1;
    if (end === 0) {
      pending = Buffer.concat([pending, bytes]);
      if (pending.length > longestRow) stop(tooLong(line));
      return;
    }
    const whole = pending.length === 0 ? bytes.subarray(0, end) : Buffer.concat([pending, bytes.subarray(0, end)]);
    pending = Buffer.from(bytes.subarray(end));
    consume(decode(whole), false);
  }

  function end(): void {
    if (stopped) return;
    consume(decode(pending), true);
  }

  function decode(bytes: Uint8Array): string {
    const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    // A piece ends at a line feed, which is no part of any longer UTF-8 sequence.
    if (!isAscii(buffer) && !isUtf8(buffer)) noteWrongLines(buffer);
    let text = buffer.toString(isAscii(buffer) ? 'latin1' : 'utf8');
    if (atStart && buffer.length > 0) {
      atStart = false;
      if (text.startsWith('\ufeff')) text = text.slice(1);
    }
    return text.includes('\r') ? text.replaceAll('\r\n', '\n') : text;
  }

  function noteWrongLines(buffer: Buffer): void {
    let at = line + count(carry, '\n');
    for (let from = 0; from < buffer.length; at += 1) {
      const feed = buffer.indexOf(10, from);
      const to = feed === -1 ? buffer.length : feed + 1;
      if (!isUtf8(buffer.subarray(from, to))) wronglyEncoded.push(at);
      from = to;
    }
  }

  function consume(piece: string, isLast: boolean): void {
    let text = skipComments(carry + piece, isLast);
    for (;;) {
      const { data, errors, cursor } = split(text, isLast);
      // Whatever follows a misplaced quotation mark is guesswork: the rows before it count, then its line is left out.
      const wrong = errors.find(({ code, row }) => code === 'InvalidQuotes' || row < data.length);
      const start = line;
      emit(wrong ? data.slice(0, wrong.row) : data, text.includes('"'));
      if (!wrong) {
        carry = text.slice(cursor);
        break;
      }
      const feed = text.indexOf('\n', wrong.index);
      const resume = feed === -1 ? text.length : feed + 1;
      sink.fault(quoteFault(wrong.code, line, text.slice(text.lastIndexOf('\n', wrong.index - 1) + 1, resume)));
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
      if (wronglyEncoded.length > 0 && claimWrongLines(fields, from)) continue;
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
      if (wronglyEncoded[0] === line) claimWrongLines([content], line);
      if (feed === -1) return '';
      from = feed + 1;
      line += 1;
    }
    return from === 0 ? text : text.slice(from);
  }

  /** Reports the wrongly encoded lines of a row that ends before the present line, or of the one comment line. */
  function claimWrongLines(fields: readonly string[], from: number): boolean {
    const until = Math.max(line, from + 1);
    let found = false;
    while (wronglyEncoded[0] !== undefined && wronglyEncoded[0] < until) {
      const field = fields.findIndex((text) => text.includes('\ufffd'));
      const value = fields[field];
      sink.fault({
        line: wronglyEncoded[0],
        ...(value === undefined ? {} : { field, value: excerpt(value) }),
        message: 'This is not UTF-8 text.',
        remedy: 'Save the table with the encoding UTF-8.',
      });
      wronglyEncoded.shift();
      found = true;
    }
    return found;
  }

  return { push, end };
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
  message: 'The row that begins here does not end within 1,048,576 characters. The table was not read further.',
  remedy: 'Look for a quotation mark without its partner.',
});

const tooManyQuotes = (line: number): CsvFault => ({
  line,
  message: `${mostQuoteFaults} rows have misplaced quotation marks. The table was not read further.`,
  remedy: 'Write a field with commas, quotation marks or line breaks between quotation marks, those inside twice.',
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
