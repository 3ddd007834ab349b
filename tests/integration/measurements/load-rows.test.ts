import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { inTransaction, select } from '@/lib/server/data/database';
import { loadRows } from '@/lib/server/data/load-rows';

const folder = mkdtempSync(path.join(tmpdir(), 'evenfall-load-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const columns = ['row_no', 'frame_id', 'star_no', 'inst_mag', 'inst_err', 'ra'];
async function load(content: string, rows: number): Promise<void> {
  const file = path.join(folder, 'rows.tsv');
  writeFileSync(file, content);
  await inTransaction((tx) =>
    loadRows(tx, { file, rows, table: 'measurements', columns, set: { set_id: '7' } }),
  );
}
const stored = (): Promise<readonly object[]> =>
  select('SELECT row_no, inst_mag, ra FROM measurements WHERE set_id = 7 ORDER BY row_no');

it('rows arrive as they were written, NULL among them', async () => {
  await load('1\t1\t1\t-7.5\t0.01\t12.25\n2\t1\t2\t1e1\t0.01\t\\N\n', 2);
  expect(await stored()).toEqual([
    { row_no: 1, inst_mag: -7.5, ra: 12.25 },
    { row_no: 2, inst_mag: 10, ra: null },
  ]);
});

it.each([
  ['a number that is none', '11\t1\t1\tnan\t0.01\t1\n', 1],
  ['a number that does not fit', '11\t1\t1\t1e999\t0.01\t1\n', 1],
  ['a row that is there already', '1\t1\t1\t-7.5\t0.01\t1\n', 1],
  ['a field too few', '11\t1\t1\t-7.5\t0.01\n', 1],
  ['a field too many', '11\t1\t1\t-7.5\t0.01\t1\t2\n', 1],
  ['a NULL where none may be', '11\t1\t1\t\\N\t0.01\t1\n', 1],
  ['a row that was announced and did not come', '11\t1\t1\t-7.5\t0.01\t1\n', 2],
])('%s fails the whole transaction, though LOCAL would only warn', async (_what, content, rows) => {
  await expect(load(`10\t1\t1\t-7\t0.01\t1\n${content}`, rows + 1)).rejects.toThrow(
    /rows loaded|measurements/,
  );
  expect(await stored()).toHaveLength(2);
});

it('a column’s name that is not plain never reaches the statement', async () => {
  const file = path.join(folder, 'rows.tsv');
  const work = inTransaction((tx) =>
    loadRows(tx, { file, rows: 0, table: 'measurements', columns: ['row_no) SET (x'], set: {} }),
  );
  await expect(work).rejects.toThrow('not plain');
});
