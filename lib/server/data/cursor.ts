import 'server-only';
import { Fault } from '@/lib/faults/fault';

type Part = string | number;
type Kind = 'string' | 'number';

/** The place in a list after its last row, as a text that means nothing outside. */
export const toCursor = (parts: readonly Part[]): string =>
  Buffer.from(JSON.stringify(parts)).toString('base64url');

/** The parts of a cursor, of the kinds that its list expects; null for the beginning of the list. */
export function fromCursor(cursor: string | undefined, kinds: readonly Kind[]): readonly Part[] | null {
  if (cursor === undefined) return null;
  const parts = parsed(cursor);
  const fits =
    Array.isArray(parts) &&
    parts.length === kinds.length &&
    kinds.every((kind, index) => typeof parts[index] === kind);
  if (fits) return parts as readonly Part[];
  throw new Fault('invalid-input', 'The cursor is not one that this list gave.', {
    issues: [{ path: 'after', value: cursor, message: 'send the `next` of the page before, or nothing' }],
  });
}

function parsed(cursor: string): unknown {
  try {
    return JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8'));
  } catch {
    // Whatever is no JSON is no cursor of ours: the caller is told so.
    return null;
  }
}

/** A page of rows, of which one more than the limit was asked for, and the cursor after it. */
export function pageOf<Row>(
  rows: readonly Row[],
  limit: number,
  cursorOf: (row: Row) => readonly Part[],
): { readonly rows: readonly Row[]; readonly next: string | null } {
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return { rows: page, next: rows.length > limit && last !== undefined ? toCursor(cursorOf(last)) : null };
}
