import { describe, expect, it } from 'vitest';
import { normalBeyond } from '@/lib/numerics/normal-distribution';
import { studentTLimit, studentTTail } from '@/lib/numerics/student-t';
import { expectDigits, expectWithin } from '@/tests/support/numbers';
import reference from '@/tests/reference/student-t.json';

describe('Student’s t against tables', () => {
  it.each(reference.printed)(
    '%d of the distribution with %d degrees of freedom lies within ±%d, as printed',
    (share = NaN, degrees = NaN, t = NaN) => {
      expectWithin(studentTLimit(1 - share, degrees), t, { absolute: 5.001e-4, unit: '' });
    },
  );

  it.each(reference.computed)(
    '%d of the distribution with %d degrees of freedom lies within ±%d, to 9 digits',
    (share = NaN, degrees = NaN, t = NaN) => {
      expectDigits(studentTLimit(1 - share, degrees), t, 9);
      expectDigits(studentTTail(t, degrees), 1 - share, 9);
    },
  );
});

describe('Student’s t against its closed forms', () => {
  it.each([0.1, 0.5, 0.6827, 0.95, 0.9999])(
    'a share of %d with 1, 2 and no end of degrees of freedom',
    (share) => {
      expectDigits(studentTLimit(1 - share, 1), Math.tan((Math.PI * share) / 2), 9);
      expectDigits(studentTLimit(1 - share, 2), share * Math.sqrt(2 / (1 - share * share)), 9);
      expectDigits(2 * normalBeyond(studentTLimit(1 - share, Infinity)), 1 - share, 9);
    },
  );

  it('more degrees of freedom never widen an interval', () => {
    const widths = [1, 1.1, 1.5, 2, 3, 7.3, 30, 1e3, 1e6, Infinity].map((nu) => studentTLimit(0.05, nu));
    expect(widths).toEqual([...widths].sort((a, b) => b - a));
    expectDigits(widths[widths.length - 1] ?? NaN, 1.959963984540054, 12);
  });

  it('no share needs no width, and the middle is certain to be exceeded', () => {
    expectWithin(studentTLimit(1, 5), 0, { absolute: 1e-12, unit: '' });
    expect(studentTTail(0, 5)).toBe(1);
    expect(studentTTail(Infinity, 5)).toBe(0);
  });
});

describe('the normal distribution', () => {
  it.each(reference.normal.rows)('%d is exceeded with probability %d', (x = NaN, probability = NaN) => {
    expectDigits(normalBeyond(x), probability, 12);
  });
});

describe('Student’s t far out and on either side', () => {
  it('has the limit whose tail was asked for', () => {
    for (const dof of [0.7, 1, 3, 17.5, 400]) {
      for (const tail of [0.5, 1e-3, 6.3e-5, 1e-9]) {
        expectDigits(studentTTail(studentTLimit(tail, dof), dof), tail, 8);
        expectDigits(studentTTail(-studentTLimit(tail, dof), dof), tail, 8);
      }
    }
  });

  it('with one degree of freedom is Cauchy’s distribution', () => {
    for (const t of [0.1, 1, 7, 4000])
      expectDigits(studentTTail(t, 1), 1 - (2 / Math.PI) * Math.atan(t), t > 100 ? 9 : 12);
  });
});

describe('what has no t is refused', () => {
  it.each([
    [0, 5],
    [-0.1, 5],
    [1.1, 5],
    [NaN, 5],
    [0.05, 0],
    [0.05, NaN],
  ])('a tail of %d with %d degrees of freedom', (tail, dof) => {
    expect(() => studentTLimit(tail, dof)).toThrow(RangeError);
  });

  it('a deviate that is not a number, a normal tail that begins below zero', () => {
    expect(() => studentTTail(NaN, 3)).toThrow(/number/);
    expect(() => normalBeyond(-1)).toThrow(/tail/);
  });
});
