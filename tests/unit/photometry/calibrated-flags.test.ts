import { describe, expect, it } from 'vitest';
import { namesOfFlags, type CalibratedFlag } from '@/lib/photometry/calibrated-flags';
import type { TransformOptions } from '@/lib/photometry/target-measurements';
import { transformTargets } from '@/lib/photometry/transform-targets';
import {
  calibration,
  targetMeasurements,
  trueInstMag,
  usualOptions,
  type FrameOf,
  type MeasurementOf,
} from '@/tests/support/targets';

const ranges = { airmass: { min: 1.1, max: 1.8 }, colour: { min: 0, max: 1.2 }, hours: { min: -2, max: 2 } };
const calibrations = [
  calibration('V', { zeroPoint: 2.5, extinction: 0.14, colourTerm: -0.06 }, ranges),
  calibration('B', { zeroPoint: 3, extinction: 0.26, colourTerm: 0.05 }, ranges),
  calibration('R', { zeroPoint: 2, extinction: 0.08, colourTerm: 0.02 }, ranges),
];
const V: FrameOf = { band: 'V', airmass: 1.4, hours: 0 };
const B: FrameOf = { band: 'B', airmass: 1.4, hours: 0 };
const assumedColour = { value: 0.5, error: 0.1 };

interface Case {
  readonly frames?: readonly FrameOf[];
  readonly BV?: number;
  readonly more?: Partial<MeasurementOf>;
  readonly options?: Partial<TransformOptions>;
}

/** Flags of a star of B−V 0.5 on one good frame in V and one in B, but for what a case changes. */
function flagsOf({ frames = [V, B], BV = 0.5, more = {}, options = {} }: Case): readonly CalibratedFlag[] {
  const star = { V: 12, BV, VR: 0.3 };
  const measured = frames.map((frame, f) => ({
    star: 0,
    frame: f,
    mag: trueInstMag(star, frame, calibrations),
    ...more,
  }));
  const found = transformTargets(targetMeasurements(frames, measured), calibrations, {
    ...usualOptions,
    ...options,
  });
  return namesOfFlags(found.flags[0] ?? Number.NaN);
}

describe('flags of calibrated stars', () => {
  const cases: readonly (readonly [string, Case, readonly CalibratedFlag[]])[] = [
    ['a star within all ranges has none', {}, []],
    ['a colour beyond the standards', { BV: 1.3 }, ['colour_range']],
    ['a colour bluer than the standards', { BV: -0.1 }, ['colour_range']],
    ['an airmass above the standards', { frames: [V, { ...B, airmass: 1.9 }] }, ['airmass_range']],
    ['an airmass below the standards', { frames: [{ ...V, airmass: 1.05 }, B] }, ['airmass_range']],
    ['a time before the standards', { frames: [{ ...V, hours: -2.1 }, B] }, ['time_range']],
    ['one band without an assumed colour', { frames: [V] }, ['single_band']],
    [
      'one band with an assumed colour',
      { frames: [B], options: { assumedColour } },
      ['single_band', 'assumed_colour'],
    ],
    [
      'V beside R without B',
      { frames: [V, { ...V, band: 'R' }], options: { assumedColour } },
      ['assumed_colour'],
    ],
    ['nothing but saturated measurements', { more: { isSaturated: true } }, ['saturated']],
    ['a signal-to-noise ratio of 8', { more: { err: 1.0857 / 8 } }, ['low_signal']],
    ['a night to be used with care', { options: { nightWithCare: true } }, ['night_with_care']],
    ['a large offset of a frame', { frames: [{ ...V, offset: 0.2 }, B] }, ['frame_offset']],
    ['a large negative offset of a frame', { frames: [{ ...V, offset: -0.2 }, B] }, ['frame_offset']],
    ['a small offset of a frame', { frames: [{ ...V, offset: 0.09 }, B] }, []],
    [
      'several at once',
      { frames: [V, { ...B, airmass: 1.9, hours: 3 }], BV: 1.4 },
      ['colour_range', 'airmass_range', 'time_range'],
    ],
  ];
  it.each(cases)('%s', (_what, one, expected) => {
    expect(flagsOf(one)).toEqual(expected);
  });

  it('two measurements of a signal-to-noise ratio of 8 make one of 11, which is not low', () => {
    expect(flagsOf({ frames: [V, V, B, B], more: { err: 1.0857 / 8 } })).toEqual([]);
  });

  it('a saturated measurement is left out where the star has others in that band', () => {
    const frames = [V, V, B];
    const mag = frames.map((frame) => trueInstMag({ V: 12, BV: 0.5 }, frame, calibrations));
    const found = transformTargets(
      targetMeasurements(frames, [
        { star: 0, frame: 0, mag: (mag[0] ?? 0) + 0.3, isSaturated: true },
        { star: 0, frame: 1, mag: mag[1] ?? 0 },
        { star: 0, frame: 2, mag: mag[2] ?? 0 },
      ]),
      calibrations,
      usualOptions,
    );
    expect([...found.counts]).toEqual([0, 1, 1, 0, 0]);
    expect(namesOfFlags(found.flags[0] ?? Number.NaN)).toEqual([]);
  });

  it('what a flagged frame shows counts for no star that was not measured on it', () => {
    const frames = [V, B, { ...V, airmass: 2.2 }];
    const at = (frame: number, star: number) => ({
      star,
      frame,
      mag: trueInstMag({ V: 12, BV: 0.5 }, frames[frame] ?? V, calibrations),
    });
    const found = transformTargets(
      targetMeasurements(frames, [at(0, 0), at(1, 0), at(0, 1), at(1, 1), at(2, 1)]),
      calibrations,
      usualOptions,
    );
    expect([...found.flags].map(namesOfFlags)).toEqual([[], ['airmass_range']]);
  });
});
