import {
  headerKey,
  measurementColumnNames,
  missingColumns,
  type ColumnMapping,
  type MeasurementColumn,
} from '@/lib/contracts/measurement-columns';
import { excerpt, type IssueText } from './issue-list';

/** What a row with too few or too many fields is told. */
export function fieldCountText(fields: readonly string[], expected: number): IssueText {
  const message = `This row has ${fields.length} ${fields.length === 1 ? 'field' : 'fields'}, the header ${expected}.`;
  if (fields[0]?.startsWith('#')) return { message, remedy: 'Comments can only stand before the header.' };
  return fields.length > expected
    ? { message, remedy: 'A text with a comma in it stands between quotation marks; decimals take a point.' }
    : { message, remedy: 'Leave a field that has no value empty, but keep its comma.' };
}

/** Everything wrong with a header. */
export function headerIssues(
  headers: readonly string[],
  mapping: ColumnMapping,
  positions: ReadonlyMap<MeasurementColumn, number>,
): (IssueText & { column?: string; value?: string })[] {
  const found: (IssueText & { column?: string; value?: string })[] = [];
  const joined = excerpt(headers.join(','));
  const other = headers.length === 1 ? /[;\t|]/.exec(headers[0] ?? '')?.[0] : undefined;
  if (other !== undefined) {
    const name = other === ';' ? 'semicolons' : other === '\t' ? 'tabs' : 'bars';
    return [
      {
        value: joined,
        message: `The fields are separated by ${name}.`,
        remedy: 'Save the table with commas between the fields.',
      },
    ];
  }
  const seen = new Set<string>();
  for (const header of headers) {
    const key = headerKey(header);
    if (key !== '' && seen.has(key)) {
      const message = `Two columns are called ${header.trim()}.`;
      found.push({
        column: header.trim(),
        value: joined,
        message,
        remedy: 'Give every column a name of its own.',
      });
    }
    seen.add(key);
  }
  for (const column of measurementColumnNames) {
    const mapped = mapping[column];
    if (mapped === undefined || seen.has(headerKey(mapped))) continue;
    const message = `The column ${column} is to be read from ${mapped}, which this file does not have.`;
    found.push({ column: mapped, value: joined, message, remedy: 'Choose another column for it.' });
  }
  for (const { message, anyOf } of missingColumns(positions)) {
    const wanted = anyOf.map((columns) => columns.join(' and ')).join(', or ');
    const remedy = `Name it ${wanted}, or say on the upload page which column it is.`;
    found.push({ value: joined, message, remedy });
  }
  return found;
}
