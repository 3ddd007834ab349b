import { closeSync, openSync, writeSync } from 'node:fs';
import path from 'node:path';

/** Tab-separated lines as LOAD DATA reads them, written in pieces; one file, or one for every so many rows. */
export interface RowFile {
  /** A line without its end; its fields are already safe. */
  readonly write: (line: string) => void;
  readonly close: () => readonly { readonly file: string; readonly rows: number }[];
}

/** Text that is written at once. [characters] */
const piece = 256 * 1024;

export function rowFile(folder: string, name: string, rowsPerFile = Infinity): RowFile {
  const files: { file: string; rows: number }[] = [];
  let descriptor: number | null = null;
  let rows = 0;
  let text = '';

  function flush(): void {
    if (text !== '' && descriptor !== null) writeSync(descriptor, text);
    text = '';
  }
  function finish(): void {
    flush();
    if (descriptor !== null) closeSync(descriptor);
    descriptor = null;
    const last = files.at(-1);
    if (last) last.rows = rows;
  }
  function begin(): void {
    finish();
    const file = path.join(folder, `${name}-${String(files.length).padStart(4, '0')}.tsv`);
    descriptor = openSync(file, 'wx', 0o600);
    files.push({ file, rows: 0 });
    rows = 0;
  }

  return {
    write: (line) => {
      if (descriptor === null || rows === rowsPerFile) begin();
      rows += 1;
      text += line + '\n';
      if (text.length > piece) flush();
    },
    close: () => {
      finish();
      return files;
    },
  };
}

/** A number for LOAD DATA: NULL where there is none. NaN never reaches the database. */
export const numberField = (value: number): string => (Number.isFinite(value) ? String(value) : '\\N');

/** Text for LOAD DATA; control characters were refused before. */
export const textField = (value: string): string =>
  value.includes('\\') ? value.replaceAll('\\', '\\\\') : value;
