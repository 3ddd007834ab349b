import { describe, expect, it } from 'vitest';
import { starKey } from '@/lib/contracts/star-name';
import { standardMatcher, type StandardTable, type StarToMatch } from '@/lib/photometry/match-standards';

interface Star {
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
  readonly pm?: readonly [number, number];
  readonly unusable?: string;
}
const table = (...stars: readonly Star[]): StandardTable => ({
  names: stars.map(({ name }) => name),
  keys: stars.map(({ name }) => starKey(name)),
  ra: Float64Array.from(stars, ({ ra }) => ra),
  dec: Float64Array.from(stars, ({ dec }) => dec),
  pmRa: Float64Array.from(stars, ({ pm }) => pm?.[0] ?? NaN),
  pmDec: Float64Array.from(stars, ({ pm }) => pm?.[1] ?? NaN),
  unusable: stars.map(({ unusable }) => unusable ?? ''),
});
const at = (ra: number, dec: number, name = ''): StarToMatch => ({ key: starKey(name), ra, dec });
const nowhere = (name: string): StarToMatch => at(NaN, NaN, name);
const arcsec = 1 / 3600;
const near2000 = { tolerance: 2, epoch_years: 0 };

describe('standardMatcher', () => {
  const sky = table(
    { name: '114-750', ra: 340.436, dec: 1.21 },
    { name: 'Zero A', ra: 0.0001, dec: 20 },
    { name: 'Pole B', ra: 200, dec: 89.9999 },
    { name: 'Pair C', ra: 50, dec: -30 },
    { name: 'Pair D', ra: 50, dec: -30 + 3 * arcsec },
    { name: 'Wrong E', ra: 80, dec: 5, unusable: 'the published position belongs to another star.' },
  );
  const match = standardMatcher(sky, near2000);

  it('knows a name in whatever case and with whatever blanks and hyphens, without a position', () => {
    for (const name of ['114-750', '114 750', ' 114750'])
      expect(match(nowhere(name))).toMatchObject({
        kind: 'matched',
        standard: 0,
        by: 'name',
        separation: NaN,
      });
    expect(match(nowhere('ZERO-a'))).toMatchObject({ standard: 1 });
  });

  it('takes the name before the position, and says when the two disagree', () => {
    const far = match(at(340.436, 1.21 + 34.2 * arcsec, '114-750'));
    expect(far).toMatchObject({ kind: 'matched', standard: 0, by: 'name' });
    expect(far.kind === 'matched' && far.caution).toBe(
      'The name is that of 114-750, but the position lies 34.2″ from it.',
    );
    expect(match(at(340.436, 1.21 + 5 * arcsec, '114-750'))).toMatchObject({ caution: '' });
  });

  it('matches a nameless star, or one with another name, by its position', () => {
    for (const name of ['', 'field star 7']) {
      const found = match(at(340.436, 1.21 + 1.5 * arcsec, name));
      expect(found).toMatchObject({ kind: 'matched', standard: 0, by: 'position' });
      expect(found.kind === 'matched' && Math.abs(found.separation - 1.5)).toBeLessThan(1e-6);
    }
  });

  it('matches across right ascension 0', () => {
    expect(match(at(359.9998, 20))).toMatchObject({ kind: 'matched', standard: 1 });
  });

  it('matches across the pole', () => {
    expect(match(at(20, 89.9999))).toMatchObject({ kind: 'matched', standard: 2 });
  });

  it('matches at the tolerance and not beyond it, and names the neighbour', () => {
    expect(match(at(340.436, 1.21 + 2 * arcsec)).kind).toBe('matched');
    expect(match(at(340.436, 1.21 + 2.01 * arcsec))).toEqual({
      kind: 'unmatched',
      reason: 'No standard lies within 2.0″. The nearest, 114-750, lies at 2.0″.',
    });
    expect(match(at(10, -60, 'X1'))).toEqual({
      kind: 'unmatched',
      reason: 'No standard has this name. No standard lies within 2.0″.',
    });
  });

  it('does not choose between two standards within the tolerance', () => {
    expect(match(at(50, -30 + 1.4 * arcsec))).toEqual({
      kind: 'unmatched',
      reason: '2 standards lie within 2.0″: Pair C at 1.4″, Pair D at 1.6″.',
    });
    expect(match(at(50, -30 + 0.9 * arcsec))).toMatchObject({ kind: 'matched', standard: 3 });
    expect(match(at(50, -30 + 1.4 * arcsec, 'pair-d'))).toMatchObject({
      kind: 'matched',
      standard: 4,
      by: 'name',
    });
  });

  it('matches no star that is marked not to be used, by name or by position, and says why', () => {
    const reason = 'Wrong E is marked not to be used: the published position belongs to another star.';
    expect(match(nowhere('wrong e'))).toEqual({ kind: 'unmatched', reason });
    expect(match(at(80, 5))).toEqual({ kind: 'unmatched', reason });
  });

  it('says that a star without position and without a known name cannot be matched', () => {
    expect(match(nowhere('X9'))).toEqual({
      kind: 'unmatched',
      reason: 'No standard has this name, and the table gives no position.',
    });
  });

  it('looks for a standard where its proper motion has taken it', () => {
    const moving = table({ name: 'Fast', ra: 100, dec: 60, pm: [3000, -4000] });
    const then = standardMatcher(moving, { tolerance: 2, epoch_years: 26.5 });
    const now = {
      ra: 100 + (3 * 26.5 * arcsec) / Math.cos((60 * Math.PI) / 180),
      dec: 60 - 4 * 26.5 * arcsec,
    };
    expect(then(at(now.ra, now.dec))).toMatchObject({ kind: 'matched', by: 'position' });
    expect(then(at(100, 60)).kind).toBe('unmatched');
  });
});
