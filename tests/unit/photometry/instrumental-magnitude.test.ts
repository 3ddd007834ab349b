import { describe, expect, it } from 'vitest';
import { expectWithin } from '@/tests/support/numbers';
import { magnitudeErrorOfFlux, magnitudeOfFlux } from '@/lib/photometry/instrumental-magnitude';

describe('instrumental magnitudes of counts', () => {
  it('a count rate of 1 has magnitude 0, a hundredfold is five magnitudes brighter', () => {
    expectWithin(magnitudeOfFlux(30, 30), 0, { absolute: 1e-12, unit: 'mag' });
    expectWithin(magnitudeOfFlux(3000, 30), -5, { absolute: 1e-12, unit: 'mag' });
  });

  it('one part in a hundred is 0.010857 mag', () => {
    expectWithin(magnitudeErrorOfFlux(1000, 10), 0.010857362, { absolute: 1e-9, unit: 'mag' });
  });

  it.each([
    [0, 1],
    [-1, 1],
    [1, 0],
    [NaN, 1],
    [1, Infinity],
  ])('refuses %d counts in %d s', (flux, exposure) => {
    expect(() => magnitudeOfFlux(flux, exposure)).toThrow(RangeError);
    expect(() => magnitudeErrorOfFlux(flux, exposure)).toThrow(RangeError);
  });
});
