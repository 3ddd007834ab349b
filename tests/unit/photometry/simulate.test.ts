import { describe, expect, it } from 'vitest';
import { bandPlace, type StarColours } from '@/lib/photometry/bands';
import {
  bandPlaces,
  equalErrors,
  simulate,
  type SimulatedBand,
  type SimulationInput,
} from '@/lib/photometry/simulate';
import reference from '@/tests/reference/transformation.json';
import { expectWithin } from '@/tests/support/numbers';

const quiet = { drift: 0, extinctionDrift: 0, colourTerm2: 0, scatterObservation: 0, scatterFrame: 0 };
const { z_v, k_v, c_v, z_b, k_b, c_b, k2 } = reference.coefficients;
const bandV: SimulatedBand = {
  zeroPoint: z_v,
  extinction: k_v,
  colourTerm: c_v,
  secondOrderExtinction: 0,
  ...quiet,
};
const bandB: SimulatedBand = {
  zeroPoint: z_b,
  extinction: k_b,
  colourTerm: c_b,
  secondOrderExtinction: k2,
  ...quiet,
};
const camera = {
  pixelScale_arcsec: 0.45,
  gain: 1.6,
  readNoise: 7,
  darkCurrent: 0.002,
  magnitudeConstant: 25,
};

const colours = (V: number[], BV: number[]): StarColours => {
  const none = new Float64Array(V.length).fill(Number.NaN);
  return { V: Float64Array.from(V), BV: Float64Array.from(BV), UB: none, VR: none, VI: none };
};

/** One frame in V and one in B for each airmass, every star on every frame. */
function night(
  stars: StarColours,
  airmasses: readonly number[],
  extra: Partial<SimulationInput> = {},
): SimulationInput {
  const nStars = stars.V.length;
  const band = airmasses.flatMap(() => ['V', 'B'] as const);
  const frame = band.flatMap((_band, f) => new Array<number>(nStars).fill(f));
  const column = (value: number): Float64Array => new Float64Array(band.length).fill(value);
  return {
    seed: 1,
    bands: { V: bandV, B: bandB },
    frames: {
      band: bandPlaces(band),
      hours: Float64Array.from(band, (_band, f) => f * 0.1),
      exposure_s: column(60),
      fwhm_arcsec: column(1.6),
      sky: column(21),
    },
    stars,
    starErrors: equalErrors(nStars, 0),
    observations: {
      frame: Uint32Array.from(frame),
      star: Uint32Array.from(frame, (_frame, o) => o % nStars),
      airmass: Float64Array.from(frame, (f) => airmasses[Math.floor(f / 2)] ?? Number.NaN),
    },
    camera,
    ...extra,
  };
}

const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;
const spread = (values: readonly number[]): number => {
  const centre = mean(values);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1));
};

/** 40 stars on 400 frames: enough to measure each scatter. */
const many = (extra: Partial<SimulationInput> = {}): SimulationInput => {
  const V = Array.from({ length: 40 }, (_, s) => 11 + (s % 8) * 0.4);
  const BV = Array.from({ length: 40 }, (_, s) => -0.2 + (s % 13) * 0.14);
  return night(
    colours(V, BV),
    Array.from({ length: 200 }, (_, k) => 1 + (k % 50) * 0.02),
    extra,
  );
};

describe('simulate', () => {
  it.each(reference.rows)(
    'V %d, B−V %d at airmass %d has the instrumental magnitudes of the closed form',
    (...row) => {
      const [V, BV, X, v, b] = row as [number, number, number, number, number];
      const { truth } = simulate(night(colours([V], [BV]), [X]));
      expectWithin(truth.instMag[0] ?? Number.NaN, v, { absolute: 5.1e-7, unit: 'mag' });
      expectWithin(truth.instMag[1] ?? Number.NaN, b, { absolute: 5.1e-7, unit: 'mag' });
    },
  );

  it('drift, extinction drift and the quadratic colour term enter as the model says', () => {
    const V = { ...bandV, drift: 0.01, extinctionDrift: 0.004, colourTerm2: 0.02 };
    const plain = simulate(night(colours([12], [0.8]), [1.2, 1.7]));
    const richer = simulate(night(colours([12], [0.8]), [1.2, 1.7], { bands: { V, B: bandB } }));
    const difference = (o: number): number => (richer.truth.instMag[o] ?? 0) - (plain.truth.instMag[o] ?? 0);
    expectWithin(difference(0), 0.02 * 0.64, { absolute: 1e-12, unit: 'mag' });
    expectWithin(difference(2), 0.01 * 0.2 + 0.004 * 0.2 * 1.7 + 0.02 * 0.64, {
      absolute: 1e-12,
      unit: 'mag',
    });
    expect(difference(1)).toBe(0);
  });

  it('the same seed gives the same night, another seed another', () => {
    const seeded = (seed: number) => simulate(night(colours([12, 13], [0.4, 1]), [1.1, 1.5, 2], { seed }));
    expect(seeded(5)).toEqual(seeded(5));
    expect(seeded(5).instMag).not.toEqual(seeded(6).instMag);
  });

  it('noise is normal with the stated error, and scatter beyond it is added in quadrature', () => {
    const noisy = { scatterObservation: 0.012 };
    const { instMag, instErr, truth } = simulate(
      many({ bands: { V: { ...bandV, ...noisy }, B: { ...bandB, ...noisy } } }),
    );
    const pulls = [...instMag].map(
      (mag, o) => (mag - (truth.instMag[o] ?? 0)) / Math.hypot(instErr[o] ?? 0, 0.012),
    );
    // 16,000 pulls: standard errors 0.008 of the mean and 0.0056 of the spread.
    expectWithin(mean(pulls), 0, { absolute: 0.03, unit: '(sigma)' });
    expectWithin(spread(pulls), 1, { absolute: 0.02, unit: '(sigma)' });
  });

  it('what a frame shares is one value on all its stars, of the stated scatter', () => {
    const shared = { scatterFrame: 0.02 };
    const { truth } = simulate(many({ bands: { V: { ...bandV, ...shared }, B: { ...bandB, ...shared } } }));
    const plain = simulate(many());
    expectWithin(spread([...truth.frameOffset]), 0.02, { absolute: 0.003, unit: 'mag' });
    for (const o of [0, 39, 40, 15_999]) {
      const offset = (truth.instMag[o] ?? 0) - (plain.truth.instMag[o] ?? 0);
      expectWithin(offset, truth.frameOffset[Math.floor(o / 40)] ?? Number.NaN, {
        absolute: 1e-12,
        unit: 'mag',
      });
    }
  });

  it('the error of a published magnitude is one value for all observations of the star, and B inherits that of V', () => {
    const input = many({ starErrors: equalErrors(40, 0.01) });
    const { truth } = simulate(input);
    const plain = simulate(many());
    const place = (star: number, band: 'B' | 'V'): number =>
      truth.starOffset[star * 5 + bandPlace[band]] ?? Number.NaN;
    const inV = Array.from({ length: 40 }, (_, s) => place(s, 'V'));
    const inB = Array.from({ length: 40 }, (_, s) => place(s, 'B'));
    expectWithin(spread(inV), 0.01, { absolute: 0.004, unit: 'mag' });
    expectWithin(spread(inB.map((b, s) => b - (inV[s] ?? 0))), 0.01, { absolute: 0.004, unit: 'mag' });
    for (const frame of [0, 20, 398]) {
      const offset = (truth.instMag[frame * 40 + 7] ?? 0) - (plain.truth.instMag[frame * 40 + 7] ?? 0);
      expectWithin(offset, inV[7] ?? Number.NaN, { absolute: 1e-12, unit: 'mag' });
    }
  });

  it('errors are those of the CCD equation: a star 5 mag brighter in pure photon noise has a tenth of the error', () => {
    const dark = { ...camera, readNoise: 0, darkCurrent: 0, gain: 1 };
    const input = night(colours([10, 15], [0.5, 0.5]), [1]);
    const frames = { ...input.frames, sky: new Float64Array(2).fill(60) };
    const { instErr } = simulate({ ...input, frames, camera: dark });
    expectWithin((instErr[1] ?? 0) / (instErr[0] ?? 1), 10, { absolute: 0.05, unit: '(ratio)' });
  });

  it('a misidentified star is measured as the other star on all its frames, and nothing else changes', () => {
    const other = { V: 13.1, BV: 1.2, UB: Number.NaN, VR: Number.NaN, VI: Number.NaN };
    const swapped = simulate(many({ disturbances: { misidentified: [{ star: 3, measured: other }] } }));
    const plain = simulate(many());
    const changed = [...swapped.truth.instMag].flatMap((mag, o) =>
      mag === plain.truth.instMag[o] ? [] : [o % 40],
    );
    expect(new Set(changed)).toEqual(new Set([3]));
    expect(changed).toHaveLength(400);
  });

  it('clouds dim frames within their time only, deepest in the middle, and never brighten', () => {
    const clouds = [{ from_hours: 10, to_hours: 20, depth: 0.8, unevenness: 0.2 }];
    const { cloud } = simulate(many({ disturbances: { clouds } })).truth;
    expect(cloud.slice(0, 100).every((value) => value === 0)).toBe(true);
    expect(cloud.slice(201).every((value) => value === 0)).toBe(true);
    expect(cloud.every((value) => value >= 0)).toBe(true);
    expectWithin(mean([...cloud.slice(140, 160)]), 0.78, { absolute: 0.12, unit: 'mag' });
  });

  it('outliers come at the stated rate and size, and do not move the noise of the others', () => {
    const outliers = { fraction: 0.1, smallest: 0.2, largest: 0.6 };
    const dirty = simulate(many({ disturbances: { outliers } }));
    const clean = simulate(many());
    const sizes = [...dirty.truth.outlier].filter((offset) => offset !== 0);
    expectWithin(sizes.length / 16_000, 0.1, { absolute: 0.01, unit: '(fraction)' });
    expect(sizes.every((size) => Math.abs(size) >= 0.2 && Math.abs(size) <= 0.6)).toBe(true);
    expectWithin(sizes.filter((size) => size > 0).length / sizes.length, 0.5, {
      absolute: 0.06,
      unit: '(fraction)',
    });
    const moved = [...dirty.instMag].filter(
      (mag, o) => dirty.truth.outlier[o] === 0 && mag !== clean.instMag[o],
    );
    expect(moved).toEqual([]);
  });

  it('a star that varies is measured with its variation', () => {
    const input = night(colours([12], [0.4]), [1, 1.1]);
    const variation = Float64Array.of(0, 0, 0.3, 0.35);
    const varied = simulate({ ...input, observations: { ...input.observations, variation } });
    const plain = simulate(input);
    const differences = [...varied.truth.instMag].map((mag, o) => mag - (plain.truth.instMag[o] ?? 0));
    differences.forEach((difference, o) =>
      expectWithin(difference, variation[o] ?? Number.NaN, { absolute: 1e-12, unit: 'mag' }),
    );
  });

  it('the brightest pixel holds the sky and the peak of the star', () => {
    const { sky_counts, peak_counts } = simulate(night(colours([9, 20], [0.5, 0.5]), [1]));
    expect(peak_counts[0]).toBeGreaterThan(65_000);
    expect((peak_counts[1] ?? 0) / (sky_counts[1] ?? 1)).toBeLessThan(3);
    expect(peak_counts[1]).toBeGreaterThan(sky_counts[1] ?? Number.NaN);
  });

  it.each([
    [
      'a frame that does not exist',
      (input: SimulationInput) => ({
        ...input,
        observations: {
          ...input.observations,
          frame: new Uint32Array(input.observations.frame.length).fill(99),
        },
      }),
    ],
    [
      'columns of different lengths',
      (input: SimulationInput) => ({
        ...input,
        observations: { ...input.observations, airmass: new Float64Array(1) },
      }),
    ],
    ['a band without coefficients', (input: SimulationInput) => ({ ...input, bands: { V: bandV } })],
    [
      'a colour that is not known',
      (input: SimulationInput) => ({
        ...input,
        frames: { ...input.frames, band: bandPlaces(['R', 'R']) },
        bands: { ...input.bands, R: bandV },
      }),
    ],
    [
      'a cloud that ends before it begins',
      (input: SimulationInput) => ({
        ...input,
        disturbances: { clouds: [{ from_hours: 2, to_hours: 1, depth: 1, unevenness: 0 }] },
      }),
    ],
  ])('%s is refused', (_what, spoil) => {
    expect(() => simulate(spoil(night(colours([12, 13], [0.4, 1]), [1.3])))).toThrow(RangeError);
  });
});
