import { expect, it } from 'vitest';
import { exportedCells, csvRow, jsonRow } from '@/lib/formats/calibrated-rows';
import { provenanceJson, provenanceLines } from '@/lib/formats/provenance';

const columns = [{ name: 'V', unit: 'mag', meaning: 'Magnitude', decimals: 5 }];

it('a comment stays one line and holds no formula, whatever people wrote into it', () => {
  const text = provenanceLines({
    facts: { programme: 'a,=cmd()\r\nb; @x', list: ['one', '"two"'], none: null },
    columns,
  });
  expect(text.split('\r\n')).toEqual([
    "# programme: a,'=cmd() b; '@x",
    '# list:',
    '#   one',
    '#   ’two’',
    '# none: ',
    '# columns:',
    '#   V [mag]: Magnitude',
    '',
  ]);
});

it('the head of a JSON file is completed to JSON by its items', () => {
  const head = provenanceJson({ facts: { night: 'a "night"', many: ['x'] }, columns });
  expect(JSON.parse(`${head}{"a":1}\n]}\n`)).toEqual({
    provenance: {
      night: 'a "night"',
      many: ['x'],
      columns: [{ name: 'V', unit: 'mag', meaning: 'Magnitude' }],
    },
    items: [{ a: 1 }],
  });
});

it.each(['=1+1', '+1', '-1', '−1', '@x', '\tx', '\rx'])(
  'a star called %j is led by an apostrophe',
  (star) => {
    const row = [star, ...Array<null>(7).fill(null), ...Array<null>(18).fill(null), null, null, 0];
    const cells = exportedCells(row, { programme: 'P', solution: 's', night: '2026-11-03' });
    expect(csvRow(cells).replace(/^"/, '').startsWith(`'${star}`)).toBe(true);
    expect((JSON.parse(jsonRow(cells)) as { star: string }).star).toBe(star);
  },
);
