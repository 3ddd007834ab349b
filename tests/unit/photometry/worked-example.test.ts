import { describe, expect, it } from 'vitest';
import { usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { solveNights } from '@/lib/photometry/solve-nights';
import { type StandardObservations } from '@/lib/photometry/standard-observations';
import { expectWithin } from '@/tests/support/numbers';

/**
 * By hand. Five stars in V, one on each frame, errors of measurement and of the standards zero, the colour term known as
 * −0.05. Then y = m − V + 0.05·(B−V) is a line in X, and all scatter is that of observations:
 *
 *     X     1.00     1.25     1.50     1.75     2.00      mean 1.50, Sxx = 0.625
 *     y    2.6540   2.6855   2.7210   2.7605   2.8040     mean 2.725
 *     k′ = (−0.5·2.654 − 0.25·2.6855 + 0.25·2.7605 + 0.5·2.804) / 0.625 = 0.09375 / 0.625 = 0.15
 *     Z  = 2.725 − 0.15·1.5 = 2.5
 *     residuals 0.004, −0.002, −0.004, −0.002, 0.004: sum of squares 0.000056, 5 − 2 = 3 degrees of freedom
 *     σ₀ = √(0.000056 / 3) = 0.0043205
 *     error of k′ = σ₀ / √0.625 = 0.0054650;  of Z = σ₀·√(1/5 + 1.5² / 0.625) = 0.0084222
 *     t for 3 degrees of freedom and 95 %: 3.18245, so that k′ = 0.15 ± 0.01739 and Z = 2.5 ± 0.02680
 */
const V = [10.0, 11.2, 10.5, 12.1, 11.0];
const BV = [0.2, 0.6, 1.0, 0.4, 0.8];
const instMag = [12.644, 13.8555, 13.171, 14.8405, 13.764];
const airmass = [1.0, 1.25, 1.5, 1.75, 2.0];

const five = (value: number): Float64Array => new Float64Array(5).fill(value);
const observations: StandardObservations = {
  night: new Uint16Array(5),
  star: Uint32Array.of(0, 1, 2, 3, 4),
  frame: Uint32Array.of(0, 1, 2, 3, 4),
  band: new Uint8Array(5).fill(2),
  instMag: Float64Array.from(instMag),
  instErr: five(0),
  airmass: Float64Array.from(airmass),
  hours: Float64Array.of(-2, -1, 0, 1, 2),
  overrule: new Uint8Array(5),
  starNames: ['A', 'B', 'C', 'D', 'E'],
  frameNumbers: Uint32Array.of(1, 2, 3, 4, 5),
  nightNames: ['2026-03-14'],
  standards: {
    V: Float64Array.from(V),
    BV: Float64Array.from(BV),
    UB: five(Number.NaN),
    VR: five(Number.NaN),
    VI: five(Number.NaN),
  },
  standardErrors: { V: five(0), BV: five(0), UB: five(0), VR: five(0), VI: five(0) },
};
const model: FitModel = {
  bands: [
    {
      band: 'V',
      terms: {
        zeroPoint: { status: 'free' },
        extinction: { status: 'free' },
        colourTerm: { status: 'fixed', value: -0.05 },
      },
    },
  ],
  limits: usualLimits,
  seed: 1,
};

describe('the worked example of the README', () => {
  const solution = solveNights(observations, model);
  const [band] = solution.bands;
  const found = (name: string) => band?.coefficients.find((one) => one.name === name);

  it.each([
    ['zeroPoint', 2.5, 0.0084222, 0.0268],
    ['extinction', 0.15, 0.005465, 0.01739],
  ])('has %s %d with error %d and interval ± %d', (name, value, error, interval95) => {
    const one = found(name);
    expectWithin(one?.value ?? Number.NaN, value, { absolute: 1e-9, unit: 'mag' });
    expectWithin(one?.error ?? Number.NaN, error, { absolute: 1e-7, unit: 'mag' });
    expectWithin(one?.interval95 ?? Number.NaN, interval95, { absolute: 1e-5, unit: 'mag' });
  });

  it('has all its scatter in the observations, and the residuals that the sum by hand has', () => {
    expectWithin(band?.scatter.observation ?? Number.NaN, 0.0043205, { absolute: 1e-7, unit: 'mag' });
    expect(band?.scatter.frame).toBeNull();
    expect(band?.dof).toBe(3);
    const rounded = Array.from(solution.observations.residual, (r) => Number(r.toFixed(9)));
    expect(rounded).toEqual([0.004, -0.002, -0.004, -0.002, 0.004]);
  });
});
