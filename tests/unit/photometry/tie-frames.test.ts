import { describe, expect, it } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
import { nBands, type StarColours } from '@/lib/photometry/bands';
import { namesOfFlags } from '@/lib/photometry/calibrated-flags';
import { bandPlaces, equalErrors, simulate, type SimulationInput } from '@/lib/photometry/simulate';
import type { TargetMeasurements } from '@/lib/photometry/target-measurements';
import { tieFrames, type SecondaryStandards } from '@/lib/photometry/tie-frames';
import { transformTargets } from '@/lib/photometry/transform-targets';
import { usualTruth } from '@/tests/support/nights';
import { expectWithin } from '@/tests/support/numbers';
import { calibratedValue, calibration, usualOptions } from '@/tests/support/targets';

const options = { leastStars: 3, bisquare: 4.685 };
const nSecondaries = 15;
const nStars = 25;
/** Total error of a secondary standard [mag]. */
const starError = 0.012;

/** Colour terms of the equipment, and a zero point and extinction that this night does not keep to. */
const colourErrors = { colourTerm: 0.006, secondOrderExtinction: 0.004 };
const believed = [
  calibration('B', usualTruth.B, { errors: { ...colourErrors, zeroPoint: 0.3 }, scatterObservation: 0.006 }),
  calibration('V', usualTruth.V, { errors: { ...colourErrors, zeroPoint: 0.3 }, scatterObservation: 0.006 }),
];

interface CloudyNight {
  readonly measurements: TargetMeasurements;
  readonly secondaries: SecondaryStandards;
  readonly truth: StarColours;
  /** Grey offset of every frame, shape (n frames) [mag]. */
  readonly offset: Float64Array;
}

/** Twelve frames in each band through two banks of cloud; fifteen stars of 25 are secondary standards. */
function cloudyNight(seed: number): CloudyNight {
  const random = createRandom(seed, 30);
  const nFrames = 24;
  const column = (n: number, of: (i: number) => number): Float64Array =>
    Float64Array.from({ length: n }, (_, i) => of(i));
  const isSecondary = (s: number): boolean => s < nSecondaries;
  const none = column(nStars, () => 0.3);
  const truth = {
    V: column(nStars, () => 11 + 2.5 * random.uniform()),
    BV: column(nStars, (s) => (isSecondary(s) ? 0.2 : -0.1) + 1.2 * random.uniform()),
    UB: none,
    VR: none,
    VI: none,
  };
  const known = (s: number): number => (isSecondary(s) ? 0 : Number.NaN);
  // The earlier release measured B and V apart.
  const [errorV, errorB] = [0, 1].map(() => column(nStars, () => starError * random.normal()));
  if (errorV === undefined || errorB === undefined) throw new Error('Two bands have errors.');
  const published = {
    ...truth,
    V: truth.V.map((value, s) => value + known(s) + (errorV[s] ?? 0)),
    BV: truth.BV.map((value, s) => value + known(s) + (errorB[s] ?? 0) - (errorV[s] ?? 0)),
  };
  const hours = column(nFrames, (f) => -3 + f / 4);
  const airmass = column(nFrames, (f) => 1.1 + 0.03 * f);
  const frame = Uint32Array.from({ length: nFrames * nStars }, (_, o) => Math.floor(o / nStars));
  const draw = (): number => random.normal();
  const input: SimulationInput = {
    seed,
    bands: {
      B: { ...usualTruth.B, colourTerm: usualTruth.B.colourTerm + 0.006 * draw(), extinction: 0.3 },
      V: { ...usualTruth.V, colourTerm: usualTruth.V.colourTerm + 0.006 * draw(), extinction: 0.2 },
    },
    frames: {
      band: bandPlaces(Array.from({ length: nFrames }, (_, f) => (f % 2 === 0 ? 'B' : 'V'))),
      hours,
      exposure_s: column(nFrames, () => 30),
      fwhm_arcsec: column(nFrames, () => 2),
      sky: column(nFrames, () => 20),
    },
    stars: truth,
    starErrors: equalErrors(nStars, 0),
    observations: {
      frame,
      star: Uint32Array.from(frame, (_f, o) => o % nStars),
      airmass: Float64Array.from(frame, (f) => airmass[f] ?? Number.NaN),
    },
    camera: { pixelScale_arcsec: 0.5, gain: 1.5, readNoise: 6, darkCurrent: 0.01, magnitudeConstant: 25 },
    disturbances: {
      clouds: [
        { from_hours: -2.5, to_hours: -0.5, depth: 0.5, unevenness: 0.3 },
        { from_hours: 0.4, to_hours: 2.4, depth: 0.9, unevenness: 0.3 },
      ],
    },
  };
  const simulated = simulate(input);
  const extinction = (f: number): number =>
    (f % 2 === 0 ? 0.3 - 0.25 : 0.2 - 0.14) * (airmass[f] ?? Number.NaN);
  return {
    measurements: {
      star: input.observations.star,
      frame,
      instMag: simulated.instMag,
      instErr: simulated.instErr,
      saturated: new Uint8Array(frame.length),
      nStars,
      frameBand: input.frames.band,
      frameAirmass: airmass,
      frameHours: hours,
      frameBjd: column(nFrames, () => 2_461_000.5),
      frameOffset: column(nFrames, () => Number.NaN),
    },
    secondaries: {
      stars: published,
      errors: column(nStars * nBands, (i) => starError + known(Math.floor(i / nBands))),
    },
    truth,
    offset: simulated.truth.frameOffset.map(
      (value, f) => value + (simulated.truth.cloud[f] ?? Number.NaN) + extinction(f),
    ),
  };
}

describe('tieFrames', () => {
  it('finds the grey offset of every frame of a cloudy night within its errors', () => {
    const night = cloudyNight(1);
    const { measurements, findings } = tieFrames(night.measurements, night.secondaries, believed, options);
    expect(findings).toEqual([]);
    expect(Math.max(...night.offset)).toBeGreaterThan(0.5);
    for (const [f, expected] of night.offset.entries()) {
      // Fifteen stars of error 0.012 and the colour term's 0.006 at B−V 0.8: 0.006 in all.
      expectWithin(measurements.frameOffset[f] ?? Number.NaN, expected, { absolute: 0.025, unit: 'mag' });
      expect(measurements.frameOffsetErr?.[f]).toBeLessThan(0.01);
    }
  });

  it('targets of 100 cloudy nights come back with pulls that are standard normal', () => {
    const pulls: Record<'V' | 'BV', number[]> = { V: [], BV: [] };
    for (let seed = 1; seed <= 100; seed += 1) {
      const night = cloudyNight(seed);
      const tied = tieFrames(night.measurements, night.secondaries, believed, options);
      const found = transformTargets(tied.measurements, tied.calibrations, usualOptions);
      for (let s = nSecondaries; s < nStars; s += 1) {
        for (const quantity of ['V', 'BV'] as const) {
          const total = Math.hypot(
            calibratedValue(found, quantity, 'random', s),
            calibratedValue(found, quantity, 'systematic', s),
          );
          const truth = night.truth[quantity][s] ?? Number.NaN;
          pulls[quantity].push((calibratedValue(found, quantity, 'value', s) - truth) / total);
        }
      }
    }
    for (const list of Object.values(pulls)) {
      const mean = list.reduce((sum, pull) => sum + pull, 0) / list.length;
      const sd = Math.sqrt(list.reduce((sum, pull) => sum + (pull - mean) ** 2, 0) / (list.length - 1));
      // The ten stars of a night share most of their error: 100 independent values, errors 0.1 and 0.07.
      expectWithin(mean, 0, { absolute: 0.3, unit: '(sigma)' });
      expectWithin(sd, 1, { absolute: 0.2, unit: '(sigma)' });
    }
  });

  it('a secondary standard that has changed by half a magnitude does not move the offsets', () => {
    const night = cloudyNight(3);
    const changed = night.secondaries.stars.V.map((value, s) => value + (s === 4 ? 0.5 : 0));
    const stars = { ...night.secondaries.stars, V: changed };
    const clean = tieFrames(night.measurements, night.secondaries, believed, options);
    const spoilt = tieFrames(night.measurements, { ...night.secondaries, stars }, believed, options);
    spoilt.measurements.frameOffset.forEach((offset, f) =>
      expectWithin(offset, clean.measurements.frameOffset[f] ?? Number.NaN, { absolute: 0.01, unit: 'mag' }),
    );
  });

  it('gross errors of single measurements do not move the offset of their frame', () => {
    const night = cloudyNight(4);
    const instMag = night.measurements.instMag.map((mag, o) => mag + (o % 11 === 0 ? 0.6 : 0));
    const clean = tieFrames(night.measurements, night.secondaries, believed, options);
    const spoilt = tieFrames({ ...night.measurements, instMag }, night.secondaries, believed, options);
    spoilt.measurements.frameOffset.forEach((offset, f) =>
      expectWithin(offset, clean.measurements.frameOffset[f] ?? Number.NaN, { absolute: 0.012, unit: 'mag' }),
    );
  });

  it('frames with different stars are tied as well as if each had all of them together', () => {
    const night = cloudyNight(5);
    const { star, frame } = night.measurements;
    // Odd frames see one half of the secondaries, even frames the other, and two stars are on all.
    const isSeen = (o: number): boolean =>
      (star[o] ?? 0) < 2 || (star[o] ?? 0) % 2 === Math.floor((frame[o] ?? 0) / 2) % 2;
    const instErr = night.measurements.instErr.map((error, o) => (isSeen(o) ? error : Number.NaN));
    const tied = tieFrames({ ...night.measurements, instErr }, night.secondaries, believed, options);
    expect(tied.findings).toEqual([]);
    tied.measurements.frameOffset.forEach((offset, f) =>
      expectWithin(offset, night.offset[f] ?? Number.NaN, { absolute: 0.03, unit: 'mag' }),
    );
  });

  it('a frame with too few secondary standards is named, not tied, and not used', () => {
    const night = cloudyNight(6);
    const { star, frame } = night.measurements;
    const instErr = night.measurements.instErr.map((error, o) =>
      frame[o] === 7 && (star[o] ?? 0) < nSecondaries - 2 ? Number.NaN : error,
    );
    const tied = tieFrames({ ...night.measurements, instErr }, night.secondaries, believed, options);
    expect(tied.findings).toEqual([
      {
        frame: 7,
        kind: 'too-few-secondaries',
        reason: '2 secondary standards agree on this frame, and 3 are needed.',
        remedy: 'Leave the frame out, or measure more stars of an earlier release on it.',
      },
    ]);
    expect(tied.nSecondaries[6]).toBe(nSecondaries);
    const found = transformTargets(tied.measurements, tied.calibrations, usualOptions);
    expect([...found.counts.subarray(20 * 5, 20 * 5 + 5)]).toEqual([0, 12, 11, 0, 0]);
  });

  it('a night without any secondary standard has all its frames named', () => {
    const night = cloudyNight(7);
    const errors = night.secondaries.errors.map(() => Number.NaN);
    const { findings } = tieFrames(night.measurements, { ...night.secondaries, errors }, believed, options);
    expect(findings).toHaveLength(24);
  });

  it('stars measured through thick cloud carry the flag of a large offset', () => {
    const night = cloudyNight(8);
    const tied = tieFrames(night.measurements, night.secondaries, believed, options);
    const found = transformTargets(tied.measurements, tied.calibrations, usualOptions);
    expect(namesOfFlags(found.flags[20] ?? Number.NaN)).toContain('frame_offset');
  });

  it('the zero point that is subtracted first does not matter', () => {
    const night = cloudyNight(9);
    const moved = believed.map((one) => ({
      ...one,
      values: one.values.map((v, i) => (i === 0 ? v + 0.7 : v)),
    }));
    const tied = tieFrames(night.measurements, night.secondaries, believed, options);
    const other = tieFrames(night.measurements, night.secondaries, moved, options);
    const [one, two] = [tied, other].map((which) =>
      transformTargets(which.measurements, which.calibrations, usualOptions),
    );
    if (one === undefined || two === undefined) throw new Error('Two nights were transformed.');
    for (const part of ['value', 'random', 'systematic'] as const) {
      expectWithin(calibratedValue(two, 'V', part, 20), calibratedValue(one, 'V', part, 20), {
        absolute: 1e-6,
        unit: 'mag',
      });
    }
  });

  it('asking for no secondary standard at all is refused', () => {
    const night = cloudyNight(1);
    expect(() =>
      tieFrames(night.measurements, night.secondaries, believed, { ...options, leastStars: 0 }),
    ).toThrow(RangeError);
  });
});
