import { describe, expect, it } from 'vitest';
import { fitMixedModel, type MixedModelFit, type MixedModelInput } from '@/lib/numerics/mixed-model';
import { type Scatter } from '@/lib/numerics/reml';
import { expectWithin } from '@/tests/support/numbers';
import reference from '@/tests/reference/mixed-model.json';

const estimate = { kind: 'estimate' } as const;

type Row = readonly number[];

function inputOf(rows: readonly Row[], tau: number): MixedModelInput {
  const column = (k: number): number[] => rows.map((row) => row[k] ?? NaN);
  const subject = Int32Array.from(column(3));
  return {
    response: Float64Array.from(column(0)),
    design: Float64Array.from([...rows.map(() => 1), ...column(1), ...column(2)]),
    columns: 3,
    sigma: Float64Array.from(column(5)),
    subject,
    subjectSigma: new Float64Array(Math.max(...subject) + 1).fill(tau),
    block: Int32Array.from(column(4)),
    observationScatter: estimate,
    blockScatter: estimate,
    priors: [],
  };
}

function fit(input: MixedModelInput): MixedModelFit {
  const outcome = fitMixedModel(input);
  if (outcome.kind === 'undetermined') throw new Error(`undetermined: ${outcome.reason}`);
  return outcome;
}

/** 1e-3 of the component, and 1e-5 where it is zero. */
function expectComponent(found: Scatter, sigma: number): void {
  expectWithin(found.sigma, sigma, { absolute: sigma === 0 ? 1e-5 : 1e-3 * sigma, unit: 'mag' });
  expect(found.state).toBe(sigma === 0 ? 'at-zero' : 'estimated');
}

describe('the mixed model against the dense minimisation of its criterion', () => {
  it.each(reference.cases)('$name: criterion, components, coefficients and covariance agree', (night) => {
    const found = fit(inputOf(night.rows, night.sigma_star));
    const { result } = night;
    expect(found.termination.reason).toBe('converged');
    expectWithin(found.criterion, result.reml_criterion, { absolute: 1e-6, unit: '' });
    expectComponent(found.observationScatter, result.sigma_observation);
    expectComponent(found.blockScatter, result.sigma_frame);
    for (const [j, value] of result.coefficients.entries()) {
      expectWithin(found.coefficients[j] ?? NaN, value, { absolute: 1e-6, unit: 'mag' });
      for (const [k, covariance] of (result.covariance[j] ?? []).entries())
        expectWithin(found.covariance[j * 3 + k] ?? NaN, covariance, {
          absolute: 1e-3 * Math.sqrt((result.covariance[j]?.[j] ?? NaN) * (result.covariance[k]?.[k] ?? NaN)),
          unit: '',
        });
    }
    expectWithin(
      found.leverage.reduce((sum, h) => sum + h, 0),
      result.leverage_sum,
      { absolute: 1e-9, unit: '' },
    );
  });
});

describe('the mixed model against a general statistics library', () => {
  it('agrees with it on a random intercept per block and equal errors', () => {
    const { rows, result } = reference.plain;
    const found = fit(
      inputOf(
        rows.map(([y, x, c, block]) => [y, x, c, 0, block, 0].map(Number)),
        0,
      ),
    );
    expectComponent(found.observationScatter, result.sigma_observation);
    expectComponent(found.blockScatter, result.sigma_frame);
    for (const [j, value] of result.coefficients.entries()) {
      expectWithin(found.coefficients[j] ?? NaN, value, { absolute: 1e-6, unit: 'mag' });
      expectWithin(Math.sqrt(found.covariance[4 * j] ?? NaN), result.standard_errors[j] ?? NaN, {
        absolute: 1e-6,
        unit: 'mag',
      });
    }
  });
});
