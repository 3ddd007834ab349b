import Papa from 'papaparse';

/** The first lines of a table, as far as choosing its columns needs them. */
export interface TableHead {
  readonly headers: readonly string[];
  /** Up to three rows, for examples. */
  readonly rows: readonly (readonly string[])[];
}

/** Comments before the header can be long; a header is not. [bytes] */
const head_bytes = 256 * 1024;

/** Reads the header and the first rows of a file; null where there is no header in its beginning. */
export async function readHead(file: File): Promise<TableHead | null> {
  const text = await file.slice(0, head_bytes).text();
  const lines = text.replace(/^\ufeff/, '').split(/\r?\n/);
  const start = lines.findIndex((line) => line.trim() !== '' && !line.startsWith('#'));
  if (start === -1) return null;
  const { data } = Papa.parse<string[]>(lines.slice(start).join('\n'), { delimiter: ',', preview: 4 });
  const [headers, ...rows] = data;
  // What no person can read is no header: the server says what the file is.
  if (headers === undefined || headers.some((header) => /[\0\ufffd]/.test(header))) return null;
  const whole = rows.filter((row) => row.length === headers.length);
  return { headers: headers.map((header) => header.trim()), rows: whole };
}
