import { Matrix, solve } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
import { coefficientOrder } from '@/lib/photometry/fit-model';
import { transformTargets } from '@/lib/photometry/transform-targets';
import reference from '@/tests/reference/transformation.json';
import { expectWithin } from '@/tests/support/numbers';
import {
  calibration,
  calibratedValue,
  closedForm,
  exact,
  five,
  inB,
  inV,
  noiselessTargets,
  targetMeasurements,
  trueInstMag,
  usualOptions,
  type FrameOf,
} from '@/tests/support/targets';

const { z_v, k_v, c_v, z_b, k_b, c_b, k2 } = reference.coefficients;

describe('errors of calibrated stars', () => {
  it('noisy measurements give the weighted least squares of all frames together, as a dense solver finds them', () => {
    const random = createRandom(11);
    const frames: FrameOf[] = Array.from({ length: 9 }, (_, f) => ({
      band: f % 3 === 0 ? 'B' : 'V',
      airmass: 1 + random.uniform(),
      hours: 4 * random.uniform() - 2,
    }));
    const measured = frames.map((frame, f) => ({
      star: 0,
      frame: f,
      mag: trueInstMag({ V: 13, BV: 0.9 }, frame, closedForm) + 0.02 * random.normal(),
      err: 0.005 + 0.02 * random.uniform(),
    }));
    const scattered = closedForm.map((one) => ({ ...one, scatterObservation: 0.01, scatterFrame: 0.006 }));
    const found = transformTargets(targetMeasurements(frames, measured), scattered, usualOptions);
    const rows = frames.map(({ band, airmass }, f) => {
      const sigma = Math.hypot(measured[f]?.err ?? Number.NaN, 0.01, 0.006);
      const isB = band === 'B';
      return { sigma, row: isB ? [1, 1 + c_b + k2 * airmass] : [1, c_v] };
    });
    const design = new Matrix(rows.map(({ sigma, row }) => row.map((value) => value / sigma)));
    const response = Matrix.columnVector(
      frames.map(({ band, airmass }, f) => {
        const constant = band === 'B' ? z_b + k_b * airmass : z_v + k_v * airmass;
        return ((measured[f]?.mag ?? Number.NaN) - constant) / (rows[f]?.sigma ?? Number.NaN);
      }),
    );
    const expected = solve(design, response);
    const covariance = solve(design.transpose().mmul(design), Matrix.eye(2));
    expectWithin(calibratedValue(found, 'V'), expected.get(0, 0), exact);
    expectWithin(calibratedValue(found, 'BV'), expected.get(1, 0), exact);
    expectWithin(calibratedValue(found, 'V', 'random'), Math.sqrt(covariance.get(0, 0)), exact);
    expectWithin(calibratedValue(found, 'BV', 'random'), Math.sqrt(covariance.get(1, 1)), exact);
    const variance = covariance.get(0, 0) + covariance.get(1, 1) + 2 * covariance.get(0, 1);
    expectWithin(calibratedValue(found, 'B', 'random'), Math.sqrt(variance), exact);
  });

  it.each(['V', 'B', 'BV', 'UB', 'VR', 'VI'] as const)(
    'the systematic error of %s is what moving each coefficient by its error does, correlations included',
    (quantity) => {
      const p = coefficientOrder.length;
      const random = createRandom(5);
      const correlated = five.map((one) => {
        const root = Array.from({ length: p * p }, () => 0.004 * random.normal());
        const at = (i: number, k: number): number => root[i * p + k] ?? Number.NaN;
        const covariance = Float64Array.from({ length: p * p }, (_, ij) => {
          const [i, j] = [Math.floor(ij / p), ij % p];
          return root.slice(0, p).reduce((sum, _root, k) => sum + at(i, k) * at(j, k), 0);
        });
        const values = one.values.map((value, i) => (i === 6 ? 0.015 : value));
        return { calibration: { ...one, values, covariance }, root };
      });
      const calibrations = correlated.map((one) => one.calibration);
      const frames: readonly FrameOf[] = (['U', 'B', 'V', 'R', 'I'] as const).flatMap((band, b) => [
        { band, airmass: 1.2 + b / 10, hours: -1.5 },
        { band, airmass: 1.9 - b / 10, hours: 2 },
      ]);
      const star = { V: 12, BV: 1.1, UB: 0.8, VR: 0.6, VI: 1.2 };
      const measurements = noiselessTargets([star], frames, calibrations);
      const found = transformTargets(measurements, calibrations, usualOptions);
      // Differences along the columns of a root of the covariance add up to the variance.
      const step = 1e-3;
      let variance = 0;
      correlated.forEach(({ root }, b) => {
        for (let k = 0; k < p; k += 1) {
          const moved = (sign: number): number =>
            calibratedValue(
              transformTargets(
                measurements,
                calibrations.map((one, other) =>
                  other === b
                    ? {
                        ...one,
                        values: one.values.map(
                          (value, i) => value + sign * step * (root[i * p + k] ?? Number.NaN),
                        ),
                      }
                    : one,
                ),
                usualOptions,
              ),
              quantity,
            );
          variance += ((moved(1) - moved(-1)) / (2 * step)) ** 2;
        }
      });
      expectWithin(calibratedValue(found, quantity, 'systematic') / Math.sqrt(variance), 1, {
        absolute: 1e-6,
        unit: '(ratio)',
      });
    },
  );

  it('more measurements reduce the random error by the root of their number and leave the systematic one', () => {
    const withErrors = [
      calibration('V', inV, { errors: { zeroPoint: 0.006, extinction: 0.004 }, scatterFrame: 0.01 }),
      calibration('B', inB, { errors: { zeroPoint: 0.008, colourTerm: 0.003 }, scatterFrame: 0.01 }),
    ];
    const frames = (repeats: number): FrameOf[] =>
      Array.from({ length: repeats }, () => [
        { band: 'V', airmass: 1.3 } as const,
        { band: 'B', airmass: 1.3 } as const,
      ]).flat();
    const once = transformTargets(
      noiselessTargets([{ V: 12, BV: 0.5 }], frames(1), withErrors),
      withErrors,
      usualOptions,
    );
    const often = transformTargets(
      noiselessTargets([{ V: 12, BV: 0.5 }], frames(16), withErrors),
      withErrors,
      usualOptions,
    );
    for (const quantity of ['V', 'B', 'BV'] as const) {
      expectWithin(
        calibratedValue(often, quantity, 'random') * 4,
        calibratedValue(once, quantity, 'random'),
        exact,
      );
      expectWithin(
        calibratedValue(often, quantity, 'systematic'),
        calibratedValue(once, quantity, 'systematic'),
        exact,
      );
      expect(calibratedValue(once, quantity, 'systematic')).toBeGreaterThan(0.005);
    }
  });

  it('pulls of noisy stars under coefficients drawn from their covariance are standard normal', () => {
    const errors = { zeroPoint: 0.01, extinction: 0.005, colourTerm: 0.006, secondOrderExtinction: 0.004 };
    const scatter = { scatterObservation: 0.008, scatterFrame: 0.006 };
    const believed = [
      calibration('V', inV, { errors, ...scatter }),
      calibration('B', inB, { errors, ...scatter }),
    ];
    const random = createRandom(20_261_201);
    const frames: readonly FrameOf[] = [1.1, 1.3, 1.7].flatMap((airmass) => [
      { band: 'V', airmass },
      { band: 'B', airmass },
      { band: 'V', airmass: airmass + 0.05 },
    ]);
    const pulls: Record<'V' | 'B' | 'BV', number[]> = { V: [], B: [], BV: [] };
    for (let night = 0; night < 1500; night += 1) {
      const truth = believed.map((one) => ({
        ...one,
        values: one.values.map(
          (value, i) => value + random.normal() * Math.sqrt(one.covariance[i * 8] ?? Number.NaN),
        ),
      }));
      const star = { V: 12, BV: 2 * random.uniform() - 0.2 };
      const measured = frames.map((frame, f) => ({
        star: 0,
        frame: f,
        mag: trueInstMag(star, frame, truth) + random.normal() * Math.hypot(0.01, 0.008, 0.006),
      }));
      const found = transformTargets(targetMeasurements(frames, measured), believed, usualOptions);
      for (const [quantity, expected] of [
        ['V', star.V],
        ['B', star.V + star.BV],
        ['BV', star.BV],
      ] as const) {
        const total = Math.hypot(
          calibratedValue(found, quantity, 'random'),
          calibratedValue(found, quantity, 'systematic'),
        );
        pulls[quantity].push((calibratedValue(found, quantity) - expected) / total);
      }
    }
    // 1,500 pulls: the mean has a standard error of 0.026, the standard deviation one of 0.018.
    for (const list of Object.values(pulls)) {
      const mean = list.reduce((sum, pull) => sum + pull, 0) / list.length;
      const sd = Math.sqrt(list.reduce((sum, pull) => sum + (pull - mean) ** 2, 0) / (list.length - 1));
      expectWithin(mean, 0, { absolute: 0.09, unit: '(sigma)' });
      expectWithin(sd, 1, { absolute: 0.065, unit: '(sigma)' });
    }
  });
});
