import { describe, expect, it } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
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

const { c_v, c_b, k2 } = reference.coefficients;

describe('transformTargets', () => {
  it.each(reference.rows)(
    'V %d, B−V %d at airmass %d come back from their instrumental magnitudes as printed',
    (...row) => {
      const [V, BV, airmass, v, b] = row as [number, number, number, number, number];
      const frames = [
        { band: 'V', airmass },
        { band: 'B', airmass },
      ] as const;
      const found = transformTargets(
        targetMeasurements(frames, [
          { star: 0, frame: 0, mag: v },
          { star: 0, frame: 1, mag: b },
        ]),
        closedForm,
        usualOptions,
      );
      expectWithin(calibratedValue(found, 'V'), V, { absolute: 1e-6, unit: 'mag' });
      expectWithin(calibratedValue(found, 'BV'), BV, { absolute: 1e-6, unit: 'mag' });
    },
  );

  it.each(reference.rows)(
    'V %d, B−V %d at airmass %d survive the way there and back to 1e-9',
    (V, BV, airmass) => {
      const frames = [
        { band: 'V', airmass: airmass ?? 0 },
        { band: 'B', airmass: airmass ?? 0 },
      ] as const;
      const star = { V: V ?? 0, BV: BV ?? 0 };
      const found = transformTargets(noiselessTargets([star], frames, closedForm), closedForm, usualOptions);
      expectWithin(calibratedValue(found, 'V'), star.V, exact);
      expectWithin(calibratedValue(found, 'BV'), star.BV, exact);
      expectWithin(calibratedValue(found, 'B'), star.V + star.BV, exact);
    },
  );

  it('all five bands, drifts, quadratic terms and known offsets of frames come back to 1e-9', () => {
    const richer = [0, 0, 0, 0, 0.004, -0.003, 0.02];
    const rich = five.map((one) => ({
      ...one,
      values: one.values.map((value, i) => value + (richer[i] ?? 0)),
    }));
    const frames: readonly FrameOf[] = (['U', 'B', 'V', 'R', 'I'] as const).flatMap((band, b) => [
      { band, airmass: 1.1 + b / 10, hours: -2, offset: 0.03 * b },
      { band, airmass: 1.6 + b / 10, hours: 3 },
    ]);
    const stars = [
      { V: 12.3, BV: 0.61, UB: 0.12, VR: 0.35, VI: 0.7 },
      { V: 14.9, BV: 1.7, UB: 1.9, VR: 1.1, VI: 2.2 },
      { V: 9.2, BV: -0.21, UB: -0.9, VR: -0.1, VI: -0.25 },
    ];
    const found = transformTargets(noiselessTargets(stars, frames, rich), rich, usualOptions);
    stars.forEach((star, s) => {
      for (const name of ['V', 'BV', 'UB', 'VR', 'VI'] as const) {
        expectWithin(calibratedValue(found, name, 'value', s), star[name], exact);
      }
    });
  });

  it('measurements in another order give the same stars', () => {
    const random = createRandom(3);
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2 },
      { band: 'B', airmass: 1.3 },
      { band: 'V', airmass: 1.4 },
    ];
    const measured = Array.from({ length: 60 }, (_, m) => ({
      star: m % 20,
      frame: Math.floor(m / 20),
      mag: 12 + random.normal(),
    }));
    const sorted = transformTargets(targetMeasurements(frames, measured), closedForm, usualOptions);
    const turned = transformTargets(
      targetMeasurements(frames, [...measured].reverse()),
      closedForm,
      usualOptions,
    );
    for (let s = 0; s < 20; s += 1) {
      expectWithin(calibratedValue(turned, 'V', 'value', s), calibratedValue(sorted, 'V', 'value', s), exact);
    }
    expect(turned.counts).toEqual(sorted.counts);
  });

  it('the worked example of lib/photometry/README.md comes out as written there', () => {
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2345 },
      { band: 'B', airmass: 1.2345 },
    ];
    const night = targetMeasurements(frames, [
      { star: 0, frame: 0, mag: 13.22515 },
      { star: 0, frame: 1, mag: 14.534117 },
    ]);
    const unsure = [calibration('V', inV, { errors: { zeroPoint: 0.01 } }), calibration('B', inB)];
    const found = transformTargets(night, unsure, usualOptions);
    const printed = { absolute: 1e-6, unit: 'mag' } as const;
    expectWithin(calibratedValue(found, 'BV'), 0.609, printed);
    expectWithin(calibratedValue(found, 'V'), 10.574, printed);
    expectWithin(calibratedValue(found, 'V', 'systematic'), 0.009431, printed);
    expectWithin(calibratedValue(found, 'BV', 'systematic'), 0.009329, printed);
  });

  it('a star in V alone takes the assumed colour, whose error is systematic; without one it has no magnitude', () => {
    const frames: readonly FrameOf[] = [{ band: 'V', airmass: 1.5 }];
    const night = noiselessTargets([{ V: 12, BV: 0.7 }], frames, closedForm);
    const assumed = transformTargets(night, closedForm, {
      ...usualOptions,
      assumedColour: { value: 0.7, error: 0.3 },
    });
    expectWithin(calibratedValue(assumed, 'V'), 12, exact);
    expectWithin(calibratedValue(assumed, 'V', 'systematic'), Math.abs(c_v) * 0.3, exact);
    expectWithin(calibratedValue(assumed, 'V', 'random'), 0.01, exact);
    expect(calibratedValue(assumed, 'BV')).toBeNaN();
    expect(calibratedValue(assumed, 'B')).toBeNaN();
    const without = transformTargets(night, closedForm, usualOptions);
    expect(calibratedValue(without, 'V')).toBeNaN();
    expect([...without.counts]).toEqual([0, 0, 0, 0, 0]);
  });

  it('a star in B alone has B, and its error by the assumed colour is that of the colour terms in B', () => {
    const night = noiselessTargets([{ V: 12, BV: 0.7 }], [{ band: 'B', airmass: 1.5 }], closedForm);
    const found = transformTargets(night, closedForm, {
      ...usualOptions,
      assumedColour: { value: 0.7, error: 0.3 },
    });
    expectWithin(calibratedValue(found, 'B'), 12.7, exact);
    expectWithin(calibratedValue(found, 'B', 'systematic'), Math.abs(c_b + k2 * 1.5) * 0.3, exact);
    expect(calibratedValue(found, 'V')).toBeNaN();
  });

  it('V−R needs V, and stands on an assumed B−V where B is missing; R alone gives nothing', () => {
    const star = { V: 12, BV: 0.7, VR: 0.4 };
    const options = { ...usualOptions, assumedColour: { value: 0.7, error: 0.1 } };
    const both: readonly FrameOf[] = [
      { band: 'V', airmass: 1.5 },
      { band: 'R', airmass: 1.4 },
    ];
    expectWithin(
      calibratedValue(transformTargets(noiselessTargets([star], both, five), five, options), 'VR'),
      0.4,
      exact,
    );
    const alone = transformTargets(noiselessTargets([star], both.slice(1), five), five, options);
    expect(calibratedValue(alone, 'VR')).toBeNaN();
    expect(alone.counts.every((count) => count === 0)).toBe(true);
  });

  it('the offset of a tied frame is subtracted and its error takes the place of the scatter of frames', () => {
    const scattered = closedForm.map((one) => ({ ...one, scatterFrame: 0.05 }));
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2, offset: 0.6, offsetErr: 0.003 },
      { band: 'B', airmass: 1.2, offset: 0.8, offsetErr: 0.003 },
    ];
    const found = transformTargets(
      noiselessTargets([{ V: 12, BV: 0 }], frames, closedForm),
      scattered,
      usualOptions,
    );
    expectWithin(calibratedValue(found, 'V'), 12, exact);
    expect(calibratedValue(found, 'V', 'random')).toBeLessThan(0.012);
  });

  it('a measurement that is not finite, has no error or lies in a band without calibration is not used', () => {
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2 },
      { band: 'B', airmass: 1.2 },
      { band: 'V', airmass: Number.NaN },
      { band: 'I', airmass: 1.2 },
    ];
    const dark: FrameOf = { band: 'V', airmass: Number.NaN };
    const mag = (frame: number): number => trueInstMag({ V: 12, BV: 0.4 }, frames[frame] ?? dark, closedForm);
    const found = transformTargets(
      targetMeasurements(frames, [
        { star: 0, frame: 0, mag: mag(0) },
        { star: 0, frame: 1, mag: mag(1) },
        { star: 0, frame: 0, mag: Number.NaN },
        { star: 0, frame: 0, mag: 20, err: 0 },
        { star: 0, frame: 2, mag: 20 },
        { star: 0, frame: 3, mag: 20 },
      ]),
      closedForm,
      usualOptions,
    );
    expectWithin(calibratedValue(found, 'V'), 12, exact);
    expect([...found.counts]).toEqual([0, 1, 1, 0, 0]);
  });

  it('a measurement with an airmass of its own is corrected by that one, and its range is looked at', () => {
    const night = noiselessTargets(
      [{ V: 12, BV: 0.4 }],
      [
        { band: 'V', airmass: 1.5 },
        { band: 'B', airmass: 1.6 },
      ],
      closedForm,
    );
    const frameAirmass = Float64Array.of(2.9, 2.9);
    const own = transformTargets(
      { ...night, frameAirmass, airmass: Float64Array.of(1.5, 1.6) },
      closedForm,
      usualOptions,
    );
    expectWithin(calibratedValue(own, 'V'), 12, exact);
    expectWithin(calibratedValue(own, 'BV'), 0.4, exact);
    expect(own.flags[0]).toBe(0);
  });

  it('date and airmass are the means of what was used, by weight', () => {
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1, bjd: 2_461_000.25 },
      { band: 'B', airmass: 2, bjd: 2_461_000.75 },
      { band: 'V', airmass: 1.9, bjd: 2_461_003 },
    ];
    const found = transformTargets(
      targetMeasurements(frames, [
        { star: 0, frame: 0, mag: 14, err: 0.01 },
        { star: 0, frame: 1, mag: 15, err: 0.02 },
        { star: 0, frame: 2, mag: 11, isSaturated: true },
      ]),
      closedForm,
      usualOptions,
    );
    expectWithin(found.airmass[0] ?? Number.NaN, 1.2, { absolute: 1e-12, unit: '(airmass)' });
    expectWithin(found.bjd[0] ?? Number.NaN, 2_461_000.35, { absolute: 2e-9, unit: 'd' });
  });

  it('colour terms that cancel the colour leave a star without magnitude instead of a wild one', () => {
    const mad = [calibration('V', inV), calibration('B', { ...inB, colourTerm: c_v - 1 - k2 * 1.2 })];
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2 },
      { band: 'B', airmass: 1.2 },
    ];
    const found = transformTargets(noiselessTargets([{ V: 12, BV: 0.4 }], frames, mad), mad, usualOptions);
    expect(calibratedValue(found, 'V')).toBeNaN();
    expect([...found.counts]).toEqual([0, 0, 0, 0, 0]);
  });

  it('a quadratic term for which no colour fits leaves a star without magnitude', () => {
    const bent = [calibration('V', inV), calibration('B', { ...inB, colourTerm2: 3 })];
    const frames: readonly FrameOf[] = [
      { band: 'V', airmass: 1.2 },
      { band: 'B', airmass: 1.2 },
    ];
    const night = targetMeasurements(frames, [
      { star: 0, frame: 0, mag: 14 },
      { star: 0, frame: 1, mag: 5 },
    ]);
    expect(calibratedValue(transformTargets(night, bent, usualOptions), 'V')).toBeNaN();
  });
});

describe('transformTargets refuses', () => {
  const frames: readonly FrameOf[] = [{ band: 'V', airmass: 1.2 }];
  const good = targetMeasurements(frames, [{ star: 0, frame: 0, mag: 14 }]);
  it.each([
    ['a star beyond the number of stars', { ...good, nStars: 0 }, closedForm],
    ['a frame that does not exist', { ...good, frame: Uint32Array.of(1) }, closedForm],
    ['columns of measurements of different lengths', { ...good, instErr: new Float64Array(2) }, closedForm],
    ['columns of frames of different lengths', { ...good, frameBjd: new Float64Array(2) }, closedForm],
    ['a band that does not exist', { ...good, frameBand: Uint8Array.of(5) }, closedForm],
    ['a band calibrated twice', good, [calibration('V', inV), calibration('V', inV)]],
    ['a covariance of another size', good, [{ ...calibration('V', inV), covariance: new Float64Array(4) }]],
  ])('%s', (_what, measurements, calibrations) => {
    expect(() => transformTargets(measurements, calibrations, usualOptions)).toThrow(RangeError);
  });
});
