import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { csvReader, type CsvFault } from '@/lib/formats/csv-reader';

interface Read {
  readonly comments: string[];
  readonly rows: { readonly line: number; readonly fields: readonly string[] }[];
  readonly faults: CsvFault[];
}

function read(content: string | Uint8Array, pieceSize = 1 << 20): Read {
  const bytes = typeof content === 'string' ? Buffer.from(content) : content;
  const found: Read = { comments: [], rows: [], faults: [] };
  const reader = csvReader({
    comment: (text) => found.comments.push(text),
    row: (fields, line) => found.rows.push({ line, fields }),
    fault: (fault) => found.faults.push(fault),
  });
  for (let at = 0; at < bytes.length; at += pieceSize) reader.push(bytes.subarray(at, at + pieceSize));
  reader.end();
  return found;
}
const rowsOf = (content: string | Uint8Array, pieceSize?: number): unknown =>
  read(content, pieceSize).rows.map(({ line, fields }) => [line, ...fields]);

const quoted = (field: string): string => `"${field.replaceAll('"', '""')}"`;
const plain = (field: string): string => (/[",\r\n]/.test(field) ? quoted(field) : field);

describe('csvReader', () => {
  it('reads a table with LF, with CRLF and without an end of its last line alike', () => {
    const expected = [
      [1, 'frame', 'star'],
      [2, '1', 'A'],
      [3, '2', 'B'],
    ];
    expect(rowsOf('frame,star\n1,A\n2,B\n')).toEqual(expected);
    expect(rowsOf('frame,star\r\n1,A\r\n2,B\r\n')).toEqual(expected);
    expect(rowsOf('frame,star\r\n1,A\n2,B')).toEqual(expected);
  });

  it('leaves a byte-order mark out of the first header', () => {
    expect(rowsOf('\ufeffframe,star\n')).toEqual([[1, 'frame', 'star']]);
  });

  it('keeps comments before the header and counts their lines', () => {
    const found = read('# made by hand\n#second, "line\n\nframe,star\n1,A\n');
    expect(found.comments).toEqual(['made by hand', 'second, "line']);
    expect(found.rows.map(({ line }) => line)).toEqual([4, 5]);
    expect(found.faults).toEqual([]);
  });

  it('gives a line that begins with # after the header as a row', () => {
    expect(rowsOf('frame,star\n#1,A\n')).toEqual([
      [1, 'frame', 'star'],
      [2, '#1', 'A'],
    ]);
  });

  it('skips blank lines and still counts them', () => {
    expect(rowsOf('a,b\n\n1,2\n   \n3,4\n')).toEqual([
      [1, 'a', 'b'],
      [3, '1', '2'],
      [5, '3', '4'],
    ]);
  });

  it('counts the lines inside quoted fields', () => {
    expect(rowsOf('a,b\n"one\ntwo\r\nthree",2\n"x","say ""hi"""\n5,6\n')).toEqual([
      [1, 'a', 'b'],
      [2, 'one\ntwo\nthree', '2'],
      [5, 'x', 'say "hi"'],
      [6, '5', '6'],
    ]);
  });

  it('names the row whose quotation mark is never closed', () => {
    const { faults } = read('a,b\n1,2\n"3,4\n5,6\n');
    expect(faults).toHaveLength(1);
    expect(faults[0]).toMatchObject({ line: 3, message: expect.stringContaining('never closed') as string });
  });

  it('names the row in which a quoted field goes on after its closing mark', () => {
    const { faults, rows } = read('a,b\n"x"y,2\n5,6\n7,"8"\n"one\ntwo","x"y\n9,10\n');
    expect(faults.map(({ line }) => line)).toEqual([2, 5]);
    expect(faults[0]?.message).toContain('goes on');
    expect(rows.map(({ line }) => line)).toEqual([1, 3, 4, 7]);
  });

  it('stops at a row without end instead of taking the file into memory', () => {
    const { faults, rows } = read(`a,b\n1,2\n"${'x,y\n'.repeat(700_000)}`);
    expect(faults).toEqual([expect.objectContaining({ line: 3 })]);
    expect(rows).toHaveLength(2);
    expect(read('x'.repeat(3_000_000), 65_536).faults).toEqual([expect.objectContaining({ line: 1 })]);
  });

  it('names line and field of text that is not UTF-8', () => {
    const bytes = Buffer.concat([
      Buffer.from('a,b\n1,\u00e9\n2,'),
      Buffer.from([0xe9]),
      Buffer.from('x\n3,c\n'),
    ]);
    const { faults, rows } = read(bytes);
    expect(faults).toEqual([
      {
        line: 3,
        field: 1,
        value: '\ufffdx',
        message: 'This is not UTF-8 text.',
        remedy: expect.any(String) as string,
      },
    ]);
    expect(rows.map(({ line }) => line)).toEqual([1, 2, 4]);
  });

  it('names the line of a comment that is not UTF-8', () => {
    const bytes = Buffer.concat([Buffer.from('# x\n# '), Buffer.from([0xe9]), Buffer.from('\na,b\n')]);
    expect(read(bytes).faults).toEqual([expect.objectContaining({ line: 2 })]);
  });

  it('gives back every table that was written by the rules, in pieces of any size', () => {
    const field = fc.oneof(
      fc.string({ maxLength: 12 }),
      fc.string({ unit: 'grapheme', maxLength: 6 }),
      fc.constantFrom('', ' ', '"', '""', 'a"b', 'a,b', 'a\nb', '#', '1.5'),
    );
    // Two or more fields: a row of one empty field is a blank line. No lone CR: a quoted CRLF is kept as LF.
    const table = fc.array(fc.array(field, { minLength: 2, maxLength: 5 }), { minLength: 1, maxLength: 20 });
    fc.assert(
      fc.property(
        table,
        fc.boolean(),
        fc.integer({ min: 1, max: 40 }),
        fc.boolean(),
        (drawn, crlf, size, allQuoted) => {
          const rows = drawn.map((row) =>
            row.map((text) => text.replaceAll('\r', '').replaceAll('\ufeff', '')),
          );
          const first = ['h', 'k'];
          const write = allQuoted ? quoted : plain;
          const content = [first, ...rows].map((row) => row.map(write).join(',')).join(crlf ? '\r\n' : '\n');
          const found = read(content, size);
          expect(found.faults).toEqual([]);
          expect(found.rows.map(({ fields }) => [...fields])).toEqual([first, ...rows]);
          let line = 1;
          const lines = [first, ...rows].map((row) => {
            const at = line;
            line += 1 + row.join('').split('\n').length - 1;
            return at;
          });
          expect(found.rows.map((row) => row.line)).toEqual(lines);
        },
      ),
      { numRuns: 300 },
    );
  });
});
