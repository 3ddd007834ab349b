type Cell = string | number | null;

/** Characters with which a spreadsheet takes a text for a formula; the minus sign of typography among them. */
const formulaStart = /^[=+\-\u2212@\t\r]/;

/** A cell by RFC 4180. A text that a spreadsheet would run is led by an apostrophe; numbers stay numbers. */
export function csvCell(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : '';
  const safe = formulaStart.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** Rows as a CSV document with CRLF. */
export const csvLines = (rows: readonly (readonly Cell[])[]): string =>
  rows.map((row) => `${row.map(csvCell).join(',')}\r\n`).join('');
