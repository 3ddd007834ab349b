import { describe, expect, it } from 'vitest';
import { usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { solveNights } from '@/lib/photometry/solve-nights';
import { type StandardObservations } from '@/lib/photometry/standard-observations';
import reference from '@/tests/reference/mixed-model.json';
import { expectWithin } from '@/tests/support/numbers';

type Case = (typeof reference.cases)[number];

/** The oracle's rows as observations in V of stars of magnitude zero. */
function observationsOf({ rows, sigma_star: starError }: Case): StandardObservations {
  const column = (at: number): number[] => rows.map((row) => row[at] ?? Number.NaN);
  const [star, frame] = [column(3), column(4)];
  const nStars = Math.max(...star) + 1;
  const BV = new Float64Array(nStars);
  column(2).forEach((colour, row) => (BV[star[row] ?? 0] = colour));
  const same = (value: number): Float64Array => new Float64Array(nStars).fill(value);
  return {
    night: new Uint16Array(rows.length),
    star: Uint32Array.from(star),
    frame: Uint32Array.from(frame),
    band: new Uint8Array(rows.length).fill(2),
    instMag: Float64Array.from(column(0)),
    instErr: Float64Array.from(column(5)),
    airmass: Float64Array.from(column(1)),
    hours: Float64Array.from(frame),
    overrule: new Uint8Array(rows.length),
    starNames: Array.from({ length: nStars }, (_, s) => `S${s}`),
    frameNumbers: Uint32Array.from({ length: Math.max(...frame) + 1 }, (_, f) => f),
    nightNames: ['2026-03-14'],
    standards: { V: same(0), BV, UB: same(Number.NaN), VR: same(Number.NaN), VI: same(Number.NaN) },
    standardErrors: { V: same(starError), BV: same(0), UB: same(0), VR: same(0), VI: same(0) },
  };
}

const model: FitModel = {
  bands: [
    {
      band: 'V',
      terms: {
        zeroPoint: { status: 'free' },
        extinction: { status: 'free' },
        colourTerm: { status: 'free' },
      },
    },
  ],
  limits: usualLimits,
  seed: 3,
};

describe('solveNights against a dense mixed model', () => {
  // Source and version: in the reference file (numpy 1.24.2, scipy 1.10.1).
  it.each(reference.cases)('has the coefficients and scatters of the case “$name”', (one) => {
    const solution = solveNights(observationsOf(one), model);
    const [band] = solution.bands;
    expect(band?.nRejected).toBe(0);
    const { result } = one;
    band?.coefficients.forEach(({ value, error }, k) => {
      expectWithin(value ?? Number.NaN, result.coefficients[k] ?? Number.NaN, {
        absolute: 1e-6,
        unit: 'mag',
      });
      const expected = Math.sqrt(result.covariance[k]?.[k] ?? Number.NaN);
      expectWithin((error ?? Number.NaN) / expected, 1, { absolute: 5e-4, unit: '1' });
    });
    for (const [found, sigma] of [
      [band?.scatter.observation, result.sigma_observation],
      [band?.scatter.frame, result.sigma_frame],
    ] as const) {
      expectWithin(found ?? Number.NaN, sigma, { absolute: Math.max(1e-5, 1e-3 * sigma), unit: 'mag' });
    }
    const leverage = solution.observations.leverage.reduce((sum, h) => sum + h, 0);
    expectWithin(leverage, result.leverage_sum, { absolute: 1e-8, unit: '1' });
  });
});
