import { describe, expect, it } from 'vitest';
import { observeNight, readDemoSky } from '@/db/seeders/demo/demo-nights';
import { readDemoWorld } from '@/db/seeders/demo/demo-world';
import { measure } from '@/db/seeders/demo/make-files';
import type { Measurement } from '@/db/seeders/demo/simulate-night';
import { airmassYoung1994 } from '@/lib/astro/airmass';
import { horizontalPlace } from '@/lib/astro/horizontal-place';
import { skyMoment } from '@/lib/astro/sky-moment';
import { bandPlace } from '@/lib/photometry/bands';
import { usualBandModel, usualLimits } from '@/lib/photometry/fit-model';
import { equalErrors } from '@/lib/photometry/simulate';
import { solveNights } from '@/lib/photometry/solve-nights';
import type { StandardObservations } from '@/lib/photometry/standard-observations';
import { expectWithin } from '@/tests/support/numbers';

const hour_ms = 3_600_000;
const world = await readDemoWorld();
const sky = await readDemoSky(world, true);
const plan = world.nights.nights.find(({ date }) => date === '2026-11-08');
if (plan === undefined) throw new Error('The demo has no cloudy night.');
const rows = measure(observeNight(plan, sky), sky, new Map(Object.entries(plan.mistaken ?? {}))).filter(
  ({ frame }) => frame.type === 'standard',
);

function observationsOf(all: readonly Measurement[]): StandardObservations {
  const stars = [...new Set(all.map(({ star }) => star))];
  const frames = [...new Set(all.map(({ frame }) => frame))];
  const known = new Map(
    all.map(({ frame }) => sky.starsOf(frame).map((star) => [star.name, star] as const)).flat(),
  );
  const zero = all.reduce((sum, { frame }) => sum + frame.utcMid / all.length, 0);
  const column = (name: 'V' | 'BV' | 'UB' | 'VR' | 'VI'): Float64Array =>
    Float64Array.from(stars, (star) => known.get(star)?.[name] ?? NaN);
  return {
    night: new Uint16Array(all.length),
    star: Uint32Array.from(all, ({ star }) => stars.indexOf(star)),
    frame: Uint32Array.from(all, ({ frame }) => frames.indexOf(frame)),
    band: Uint8Array.from(all, ({ frame }) => bandPlace[frame.band ?? 'V']),
    instMag: Float64Array.from(all, ({ instMag }) => instMag),
    instErr: Float64Array.from(all, ({ instErr }) => instErr),
    airmass: Float64Array.from(all, ({ frame, ra, dec }) =>
      airmassYoung1994(
        horizontalPlace(skyMoment(world.observatory.site, frame.utcMid), ra, dec).zenithDistance,
      ),
    ),
    hours: Float64Array.from(all, ({ frame }) => (frame.utcMid - zero) / hour_ms),
    overrule: new Uint8Array(all.length),
    starNames: stars,
    frameNumbers: Uint32Array.from(frames, ({ number }) => number),
    nightNames: [plan?.date ?? ''],
    standards: { V: column('V'), BV: column('BV'), UB: column('UB'), VR: column('VR'), VI: column('VI') },
    standardErrors: equalErrors(stars.length, 0.003),
  };
}

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
