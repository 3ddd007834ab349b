import { describe, expect, it } from 'vitest';
import { bandPlace } from '@/lib/photometry/bands';
import { calibrationOf } from '@/lib/photometry/band-calibration';
import { usualBandModel, usualLimits } from '@/lib/photometry/fit-model';
import { solveNights } from '@/lib/photometry/solve-nights';
import { transformTargets } from '@/lib/photometry/transform-targets';
import { demoStandards } from '@/tests/support/demo-standards';

const { rows, known, airmassOf, hoursOf, observationsOf } = await demoStandards('2026-11-03');
/** Fields whose stars the fit never sees. */
const unseen: ReadonlySet<string> = new Set(['SA 98', 'SA 113']);
const isUnseen = (object: string): boolean => unseen.has(object);

/**
 * From uploaded numbers to calibrated ones: a fit to some of the standard fields of a night gives back the published
 * magnitudes of the others within their errors. Published values: Landolt 2009, The Astronomical Journal 137, 4186.
 */
describe('published standards that the fit has not seen', () => {
  const solution = solveNights(observationsOf(rows.filter(({ frame }) => !isUnseen(frame.object))), {
    bands: [usualBandModel('B'), usualBandModel('V')],
    limits: usualLimits,
    seed: 1,
  });
  const calibrations = solution.bands.map((band) => {
    const calibration = calibrationOf(band);
    if (calibration === null) throw new Error(`${band.band} is not determined.`);
    return calibration;
  });
  const mine = rows.filter(
    ({ frame }) => isUnseen(frame.object) && (frame.band === 'B' || frame.band === 'V'),
  );
  const stars = [...new Set(mine.map(({ star }) => star))];
  const frames = [...new Set(mine.map(({ frame }) => frame))];
  const firstOf = new Map(mine.map((row) => [row.frame, row] as const));
  const ofFrames = (value: (row: (typeof mine)[number]) => number): Float64Array =>
    Float64Array.from(frames, (frame) => {
      const row = firstOf.get(frame);
      return row === undefined ? NaN : value(row);
    });
  const found = transformTargets(
    {
      star: Uint32Array.from(mine, ({ star }) => stars.indexOf(star)),
      frame: Uint32Array.from(mine, ({ frame }) => frames.indexOf(frame)),
      instMag: Float64Array.from(mine, ({ instMag }) => instMag),
      instErr: Float64Array.from(mine, ({ instErr }) => instErr),
      saturated: new Uint8Array(mine.length),
      airmass: Float64Array.from(mine, airmassOf),
      nStars: stars.length,
      frameBand: Uint8Array.from(frames, ({ band }) => bandPlace[band ?? 'V']),
      frameAirmass: ofFrames(airmassOf),
      frameHours: ofFrames(hoursOf),
      frameBjd: new Float64Array(frames.length).fill(2461348.5),
      frameOffset: new Float64Array(frames.length).fill(NaN),
    },
    calibrations,
    { assumedColour: null, lowSignal: 10, largeOffset: 0.1, nightWithCare: false },
  );

  it.each([
    ['V', 0.003],
    ['BV', 0.003],
  ] as const)('come back in %s within their errors', (quantity, published) => {
    const column = found.columns[quantity];
    const pulls = stars.flatMap((star, s) => {
      const difference = (column.value[s] ?? NaN) - (known.get(star)?.[quantity] ?? NaN);
      const error = Math.hypot(column.random[s] ?? NaN, column.systematic[s] ?? NaN, published);
      return Number.isFinite(difference) ? [difference / error] : [];
    });
    expect(pulls.length).toBeGreaterThan(40);
    const mean = pulls.reduce((sum, pull) => sum + pull, 0) / pulls.length;
    const square = pulls.reduce((sum, pull) => sum + pull ** 2, 0) / pulls.length;
    // Errors of coefficients and frames are common to a field, so the mean is not that of independent stars.
    expect(Math.abs(mean)).toBeLessThan(1);
    expect(Math.sqrt(square)).toBeGreaterThan(0.6);
    expect(Math.sqrt(square)).toBeLessThan(1.4);
    expect(pulls.filter((pull) => Math.abs(pull) > 4)).toEqual([]);
  });
});
