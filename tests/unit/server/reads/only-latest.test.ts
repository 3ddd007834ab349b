import { describe, expect, it } from 'vitest';
import { onlyLatest } from '@/lib/server/reads/only-latest';

const sets = [
  { id: 4, publicId: '', name: 'First try', sha256: '' },
  { id: 9, publicId: '', name: 'Better aperture', sha256: '' },
];

/** Rows as [set, row, frame, standard]; magnitudes tell them apart. */
const columns = (rows: readonly (readonly [number, number, number, number])[]) => ({
  setId: rows.map(([set]) => set),
  rowNo: rows.map(([, row]) => row),
  frameId: rows.map(([, , frame]) => frame),
  standardId: rows.map(([, , , star]) => star),
  instMag: rows.map(([set, row]) => set + row / 100),
  instErr: rows.map(() => 0.01),
});

describe('measurements of one star on one frame in two sets', () => {
  it('count once, as the later set has them, and the fit is told', () => {
    const { rows, findings } = onlyLatest(
      columns([
        [4, 1, 20, 7],
        [4, 2, 20, 8],
        [4, 3, 21, 7],
        [9, 1, 20, 7],
        [9, 2, 21, 7],
      ]),
      sets,
    );
    expect(rows.instMag).toEqual([4.02, 9.01, 9.02]);
    expect(rows.rowNo).toEqual([2, 1, 2]);
    expect(findings).toMatchObject([
      {
        weight: 'caution',
        reason: '2 measurements of the set “First try” stand in a later set too: the later ones count.',
      },
    ]);
  });

  it('stay when one set has them twice, and nothing is said when no set repeats another', () => {
    const all = columns([
      [4, 1, 20, 7],
      [4, 2, 20, 7],
      [9, 1, 22, 7],
    ]);
    expect(onlyLatest(all, sets)).toEqual({ rows: all, findings: [] });
  });
});
