import { describe, expect, it } from 'vitest';
import { usualBandModel, usualLimits } from '@/lib/photometry/fit-model';
import { solveNights } from '@/lib/photometry/solve-nights';
import { demoStandards } from '@/tests/support/demo-standards';
import { expectWithin } from '@/tests/support/numbers';

const { plan, rows, observationsOf } = await demoStandards('2026-11-08');

/** Four of nine frames a band in cloud, and one star in another's place: what a fit must find by itself. */
describe('a night with banks of cloud over four frames in nine', () => {
  const solution = solveNights(observationsOf(rows), {
    bands: [usualBandModel('B'), usualBandModel('V')],
    limits: usualLimits,
    seed: 1,
  });

  it.each(['B', 'V'] as const)('gives the coefficients of the clear part in %s', (band) => {
    const found = solution.bands.find((one) => one.band === band);
    const truth = plan.truth[band];
    for (const name of ['zeroPoint', 'extinction', 'colourTerm'] as const) {
      const coefficient = found?.coefficients.find((one) => one.name === name);
      expectWithin(coefficient?.value ?? NaN, truth?.[name] ?? NaN, {
        absolute: 4 * (coefficient?.error ?? NaN),
        unit: 'its unit',
      });
    }
    expect(found?.scatter.frame).toBeLessThan(0.02);
  });

  it.each(['B', 'V'] as const)('names the bank in %s', (band) => {
    const kinds = solution.findings.filter((one) => one.band === band).map(({ kind }) => kind);
    expect(kinds).toContain('run-rejected');
  });

  it('names the star in V, where the two differ by half a magnitude; in B they nearly agree', () => {
    const star = solution.findings.find((one) => one.band === 'V' && one.kind === 'star-rejected');
    expect(star?.reason).toContain('92 425');
  });
});
