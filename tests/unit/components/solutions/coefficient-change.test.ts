import { describe, expect, it } from 'vitest';
import { changeInErrors, solutionBefore } from '@/app/_components/solutions/coefficient-change';
import { indexWords, standingOf, summaryWords } from '@/app/_components/solutions/solution-words';
import { coefficient, solution } from './solution';

describe('the change of a coefficient', () => {
  it('is counted in its own standard errors', () => {
    expect(changeInErrors(coefficient('extinction', 0.25, 0.125), coefficient('extinction', 0.5, 0.01))).toBe(
      -2,
    );
  });

  it('is not told of a fixed one, of one not determined, nor where there was none', () => {
    const now = coefficient('extinction', 0.15, 0.005);
    expect(changeInErrors(coefficient('extinction', 0.15, 0), now)).toBeNull();
    expect(changeInErrors(now, coefficient('extinction', null, null))).toBeNull();
    expect(changeInErrors(now, undefined)).toBeNull();
  });
});

describe('the solution before', () => {
  const first = solution({ id: '3kq8v7m2t0x1', number: 1 });
  const second = solution({ id: '3kq8v7m2t0x2', number: 2 });
  const unsolved = solution({ id: '3kq8v7m2t0x5', number: 3, outcome: null });

  it('is the one it was made from, else the last one solved before it', () => {
    const fourth = solution({ id: '3kq8v7m2t0x4', number: 4 });
    const all = [fourth, unsolved, second, first];
    expect(solutionBefore({ ...fourth, follows: first.id }, all)).toBe(first);
    expect(solutionBefore(fourth, all)).toBe(second);
    expect(solutionBefore(first, all)).toBeNull();
  });
});

describe('a solution in words', () => {
  it('writes a colour index as a difference', () => {
    expect(indexWords('BV')).toBe('B−V');
    expect(indexWords('B−V')).toBe('B−V');
  });

  it('is one line of model, bands, airmass and counts', () => {
    expect(summaryWords(solution())).toBe(
      'Mixed model, B and V, airmass after Young 1994, 212 observations of 37 standards on 40 frames, 9 rejected',
    );
  });

  it.each([
    ['queued', 'running'],
    ['running', 'running'],
    ['failed', 'not finished'],
    ['cancelled', 'not finished'],
  ] as const)('of which the job is %s stands as %s', (state, standing) => {
    const job = { id: '3kq8v7m2t0j1', state, progress: 0, message: '' };
    expect(standingOf(solution({ outcome: null, job }))).toBe(standing);
  });
});
