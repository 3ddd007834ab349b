import { describe, expect, it } from 'vitest';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { observationReasons } from '@/lib/photometry/night-solution';
import { solveNights } from '@/lib/photometry/solve-nights';
import { standardNight, type NightPlan } from '@/tests/support/standard-night';

/**
 * False alarms. At 4 standard errors chance alone rejects 1 good observation in 16,000; of stars, frames and runs there
 * may be one false alarm of each kind in a hundred nights. Limits are passed by chance in one set of seeds of several
 * hundred: 4 of 11,520 observations, where 0.7 are expected, 2 of fewer; 6 structures in 60 nights, where 1.8 may be.
 */
const nights = 60;
const model: FitModel = { bands: [usualBandModel('V')], limits: usualLimits, seed: 9 };

const ofStructures: readonly string[] = ['star-rejected', 'frame-rejected', 'run-rejected'];

function alarms(plan: Partial<NightPlan>): { rejected: number; observations: number; structures: number } {
  const total = { rejected: 0, observations: 0, structures: 0 };
  for (let k = 0; k < nights; k += 1) {
    const { observations } = standardNight({ ...plan, seed: 40_000 + k });
    const { observations: results, findings } = solveNights(observations, model);
    total.observations += results.reason.length;
    total.rejected += results.reason.filter((code) => code === observationReasons.outlier).length;
    total.structures += findings.filter(({ kind }) => ofStructures.includes(kind)).length;
  }
  return total;
}

describe('clean nights', () => {
  it('lose next to no observation and no star, frame or run', { timeout: 60_000 }, () => {
    const { rejected, observations, structures } = alarms({});
    expect(observations).toBe(nights * 24 * 8);
    expect(rejected).toBeLessThanOrEqual(4);
    expect(structures).toBeLessThanOrEqual(6);
  });

  it('of few frames lose none either', { timeout: 60_000 }, () => {
    const { rejected, structures } = alarms({ frames: 8, fields: 4 });
    expect(rejected).toBeLessThanOrEqual(2);
    expect(structures).toBeLessThanOrEqual(6);
  });

  it('with one star a frame lose next to no observation', { timeout: 60_000 }, () => {
    const { rejected } = alarms({ frames: 40, fields: 40, starsPerFrame: 1 });
    expect(rejected).toBeLessThanOrEqual(2);
  });
});
