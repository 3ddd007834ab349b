import { closeSync, openSync, writeSync } from 'node:fs';
import path from 'node:path';
import type { Slice } from '@/lib/contracts/measurement-check';

/** Tab-separated lines as LOAD DATA reads them, in files of limited size. */
export interface RowFile {
  /** A line without its end; its fields are already safe. */
  readonly write: (line: string) => void;
  /** After the last line. */
  readonly close: () => void;
}

/**
 * What one statement loads. The connector takes a file into memory whole and sends it as one packet of the protocol: one
 * larger than the server's limit, usually 16 MiB, ends in a lost connection. [characters]
 */
const largestFile = 4 * 1024 * 1024;
/** Text that is written at once. [characters] */
const piece = 256 * 1024;

/** Files `NAME-0000.tsv`, …; each is handed over when it is complete. */
export function rowFile(folder: string, name: string, onFile: (slice: Slice) => void): RowFile {
  let file = '';
  let descriptor: number | null = null;
  let count = 0;
  let rows = 0;
  let written = 0;
  let text = '';

  function begin(): number {
    file = path.join(folder, `${name}-${String(count).padStart(4, '0')}.tsv`);
    count += 1;
    rows = 0;
    written = 0;
    return openSync(file, 'wx', 0o600);
  }
  function flush(): void {
    if (text === '') return;
    descriptor ??= begin();
    writeSync(descriptor, text);
    written += text.length;
    text = '';
  }
  function finish(): void {
    flush();
    if (descriptor === null) return;
    closeSync(descriptor);
    descriptor = null;
    onFile({ file, rows });
  }

  return {
    write: (line) => {
      if (descriptor === null) descriptor = begin();
      rows += 1;
      text += line + '\n';
      if (text.length > piece) flush();
      if (written > largestFile) finish();
    },
    close: finish,
  };
}

/** A number for LOAD DATA: NULL where there is none. NaN never reaches the database. */
export const numberField = (value: number): string => (Number.isFinite(value) ? String(value) : '\\N');

/** Text for LOAD DATA; control characters were refused before. */
export const textField = (value: string): string =>
  value.includes('\\') ? value.replaceAll('\\', '\\\\') : value;
