import { describe, it } from 'vitest';
import { studentTLimit, studentTTail } from '@/lib/numerics/student-t';
import { expectWithin } from '@/tests/support/numbers';

describe('Student’s t', () => {
  // Abramowitz and Stegun 1964, Handbook of Mathematical Functions, table 26.10.
  it.each([
    [1, 12.706],
    [2, 4.303],
    [5, 2.571],
    [10, 2.228],
    [30, 2.042],
    [120, 1.98],
    [Infinity, 1.96],
  ])('with %d degrees of freedom 95 %% lie within %d', (dof, limit) => {
    expectWithin(studentTLimit(0.05, dof), limit, { absolute: 6e-4, unit: '1' });
  });

  it('with one degree of freedom is Cauchy’s distribution', () => {
    for (const t of [0.1, 1, 7, 4000]) {
      expectWithin(studentTTail(t, 1) / (1 - (2 / Math.PI) * Math.atan(t)), 1, {
        absolute: 1e-9,
        unit: '1',
      });
    }
  });

  it('has the limit whose tail was asked for, far out too', () => {
    for (const dof of [1, 3, 17.5, 400]) {
      for (const tail of [0.5, 1e-3, 6.3e-5, 1e-9]) {
        expectWithin(studentTTail(studentTLimit(tail, dof), dof) / tail, 1, { absolute: 1e-8, unit: '1' });
      }
    }
  });

  it('without end of degrees of freedom is the normal distribution', () => {
    expectWithin(studentTTail(4, Infinity) / 6.334248366623985e-5, 1, { absolute: 1e-3, unit: '1' });
  });
});
