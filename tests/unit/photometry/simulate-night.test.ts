import { describe, expect, it } from 'vitest';
import { bandPlace } from '@/lib/photometry/bands';
import { simulateNight, type NightRecipe } from '@/lib/photometry/simulate-night';
import { transformTargets } from '@/lib/photometry/transform-targets';
import { expectWithin } from '@/tests/support/numbers';
import { nightRecipe, usualTruth } from '@/tests/support/nights';
import { calibratedValue, calibration, usualOptions } from '@/tests/support/targets';

const mean = (values: ArrayLike<number>): number =>
  Array.from(values).reduce((sum, value) => sum + value, 0) / values.length;

describe('simulateNight', () => {
  it('the same seed gives the same night, another seed another', () => {
    expect(simulateNight(nightRecipe(4))).toEqual(simulateNight(nightRecipe(4)));
    expect(simulateNight(nightRecipe(4)).standards.instMag).not.toEqual(
      simulateNight(nightRecipe(5)).standards.instMag,
    );
  });

  it('nights of one star seed have the same standards, measured anew', () => {
    const [one, two] = [1, 2].map((seed) => simulateNight(nightRecipe(seed, { starSeed: 9 })).standards);
    expect(two?.standards).toEqual(one?.standards);
    expect(two?.instMag).not.toEqual(one?.instMag);
  });

  it('visits give one frame in each band, a few stars on each, over the whole range of airmass', () => {
    const { standards } = simulateNight(nightRecipe(1));
    expect(standards.frameNumbers).toHaveLength(48);
    expect(new Set(standards.band)).toEqual(new Set([bandPlace.B, bandPlace.V]));
    const perFrame = Array.from({ length: 48 }, (_, f) => standards.frame.filter((one) => one === f).length);
    expect(Math.max(...perFrame)).toBe(5);
    expect(Math.min(...perFrame)).toBeGreaterThanOrEqual(1);
    expect(Math.min(...standards.airmass)).toBeLessThan(1.1);
    expect(Math.max(...standards.airmass)).toBeGreaterThan(2);
  });

  it('hours count from the mean time of the observations of standards', () => {
    const { standards } = simulateNight(nightRecipe(2));
    expectWithin(mean(standards.hours), 0, { absolute: 1e-12, unit: 'h' });
    expect(Math.max(...standards.hours)).toBeGreaterThan(3.5);
  });

  it('airmass does not follow the time, so that drift and extinction can be told apart', () => {
    const correlations = Array.from({ length: 20 }, (_, seed) => {
      const { hours, airmass } = simulateNight(nightRecipe(seed)).standards;
      const [h, x] = [mean(hours), mean(airmass)];
      const product = (a: Float64Array, b: Float64Array): number =>
        a.reduce(
          (sum, value, o) => sum + (value - (a === hours ? h : x)) * ((b[o] ?? 0) - (b === hours ? h : x)),
          0,
        );
      return product(hours, airmass) / Math.sqrt(product(hours, hours) * product(airmass, airmass));
    });
    // 24 visits: a standard error of 0.2 each, 0.05 for the mean of twenty.
    expectWithin(mean(correlations), 0, { absolute: 0.2, unit: '(correlation)' });
    expect(Math.max(...correlations.map(Math.abs))).toBeLessThan(0.8);
  });

  it('targets come back to their true magnitudes through the true coefficients', () => {
    const { targets, truth } = simulateNight(nightRecipe(3, { nTargets: 40, nTargetFrames: 6 }));
    const scatter = { scatterObservation: 0.006, scatterFrame: 0.006 };
    const calibrations = (['B', 'V'] as const).map((band) => calibration(band, usualTruth[band], scatter));
    const found = transformTargets(targets, calibrations, usualOptions);
    for (let s = 0; s < 40; s += 1) {
      for (const quantity of ['V', 'BV'] as const) {
        const pull =
          (calibratedValue(found, quantity, 'value', s) - (truth.targets[quantity][s] ?? Number.NaN)) /
          calibratedValue(found, quantity, 'random', s);
        // Eighty pulls: one in 20,000 sets of good ones reaches this.
        expectWithin(pull, 0, { absolute: 5, unit: '(sigma)' });
      }
    }
  });

  it('a cloudy visit dims its own frames in all bands and no others, and no target', () => {
    const clear = simulateNight(nightRecipe(7));
    const cloudy = simulateNight(nightRecipe(7, { cloudyVisit: { visit: 5, depth: 0.3 } }));
    const dimmed = Array.from(cloudy.truth.standards.cloud).flatMap((cloud, f) => (cloud > 0 ? [f] : []));
    expect(dimmed).toEqual([10, 11]);
    expect(cloudy.truth.standards.cloud[10]).toBeGreaterThan(0.1);
    expect(cloudy.targets).toEqual(clear.targets);
  });

  it('gross errors and misidentified stars fall on standards only', () => {
    const other = { V: 12.9, BV: 1.5, UB: 1, VR: 0.8, VI: 1.6 };
    const clean = simulateNight(nightRecipe(8));
    const spoilt = simulateNight(
      nightRecipe(8, {
        disturbances: {
          outliers: { fraction: 0.1, smallest: 0.2, largest: 0.5 },
          misidentified: [{ star: 6, measured: other }],
        },
      }),
    );
    expect(spoilt.targets).toEqual(clean.targets);
    expect(spoilt.standards.standards).toEqual(clean.standards.standards);
    expectWithin(mean(spoilt.truth.standards.outlier.map((value) => +(value !== 0))), 0.1, {
      absolute: 0.08,
      unit: '(fraction)',
    });
  });

  it.each<readonly [string, Partial<NightRecipe>]>([
    ['no field', { nFields: 0 }],
    ['a part of a visit', { nVisits: 2.5 }],
    ['a negative number of targets', { nTargets: -1 }],
    ['no band', { bands: {} }],
    ['a cloud on a visit that is not made', { cloudyVisit: { visit: 24, depth: 0.1 } }],
  ])('%s is refused', (_what, changes) => {
    expect(() => simulateNight(nightRecipe(1, changes))).toThrow(RangeError);
  });
});
