import { describe, expect, it } from 'vitest';
import { columnPositions, guessMapping, missingColumns } from '@/lib/contracts/measurement-columns';

describe('columns of a measurement table', () => {
  it('are found by name without case and blanks', () => {
    expect([...columnPositions([' Frame', 'STAR', 'other', 'Inst_Mag '], {})]).toEqual([
      ['frame', 0],
      ['star', 1],
      ['inst_mag', 3],
    ]);
  });

  it('a header that is mapped to one column no longer counts for another', () => {
    const positions = columnPositions(['frame', 'sky', 'fwhm'], { peak: 'SKY' });
    expect([...positions]).toEqual([
      ['frame', 0],
      ['fwhm', 2],
      ['peak', 1],
    ]);
  });

  it('what is missing is said with every way to mend it', () => {
    expect(missingColumns(new Set(['frame', 'star', 'flux', 'flux_err'] as const))).toEqual([]);
    expect(
      missingColumns(new Set(['frame', 'ra', 'dec', 'inst_mag'] as const)).map(({ anyOf }) => anyOf),
    ).toEqual([[['inst_err'], ['flux', 'flux_err']]]);
    expect(missingColumns(new Set())).toHaveLength(4);
  });

  it('a first guess maps headers in plain words, each once, and leaves ours alone', () => {
    expect(
      guessMapping([
        'Line',
        'image',
        'Right ascension',
        'Declination',
        'MAGNITUDE',
        'Uncertainty',
        'FLAGS',
        'x',
      ]),
    ).toEqual({
      frame: 'image',
      ra: 'Right ascension',
      dec: 'Declination',
      inst_mag: 'MAGNITUDE',
      inst_err: 'Uncertainty',
      flag: 'FLAGS',
    });
    expect(guessMapping(['Right Ascension', 'DEC (deg)', 'Mag.'])).toEqual({
      ra: 'Right Ascension',
      dec: 'DEC (deg)',
      inst_mag: 'Mag.',
    });
    expect(guessMapping(['frame', 'star', 'inst_mag', 'inst_err', 'name'])).toEqual({});
  });
});
