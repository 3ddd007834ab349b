import { describe, expect, it } from 'vitest';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { type BandSolution, type NightSolution } from '@/lib/photometry/night-solution';
import { solveNights } from '@/lib/photometry/solve-nights';
import { standardNight, type NightPlan, type SimulatedNight } from '@/tests/support/standard-night';

const model = (...bands: ('U' | 'B' | 'V' | 'R' | 'I')[]): FitModel => ({
  bands: bands.map(usualBandModel),
  limits: usualLimits,
  seed: 20260314,
});
const inV = model('V');

function solved(change: Partial<NightPlan>, fitModel = inV): SimulatedNight & { solution: NightSolution } {
  const night = standardNight(change);
  return { ...night, solution: solveNights(night.observations, fitModel) };
}

function onlyBand({ bands }: NightSolution): BandSolution {
  const [band] = bands;
  if (band === undefined) throw new Error('There is no band.');
  return band;
}

/** Every determined coefficient within so many of its errors of the truth. */
function expectTruth(
  { solution, truth }: SimulatedNight & { solution: NightSolution },
  sigmas: number,
): void {
  for (const band of solution.bands) {
    expect(band.outcome, JSON.stringify(solution.findings)).toBe('determined');
    for (const { name, value, error } of band.coefficients) {
      if (value === null || error === null || error === 0) continue;
      const pull = (value - (truth[band.band]?.[name] ?? Number.NaN)) / error;
      expect(Math.abs(pull), `${band.band} ${name} has a pull of ${pull}`).toBeLessThan(sigmas);
    }
  }
}

describe('solveNights', () => {
  it(
    'finds the truth of a clean night in five bands and rejects next to nothing',
    { timeout: 30_000 },
    () => {
      const night = solved(
        { bands: ['U', 'B', 'V', 'R', 'I'], seed: 3, frames: 16, starsPerFrame: 6 },
        model('U', 'B', 'V', 'R', 'I'),
      );
      expectTruth(night, 4);
      for (const { nRejected, nUsed } of night.solution.bands)
        expect(nRejected).toBeLessThanOrEqual(0.01 * nUsed);
    },
  );

  it('one observation in ten being grossly wrong does not move the coefficients by more than their errors', () => {
    const night = solved({
      seed: 4,
      disturbances: { outliers: { fraction: 0.1, smallest: 0.1, largest: 1 } },
    });
    expectTruth(night, 4);
    const { used } = night.solution.observations;
    const believed = night.simulation.truth.outlier.filter((size, o) => size !== 0 && used[o] === 1);
    expect([...believed]).toEqual([]);
  });

  it('a misidentified star of extreme colour is found and said to be one', () => {
    const measured = { V: 10.6, BV: 0.5, UB: 0.2, VR: 0.3, VI: 0.6 };
    const night = solved({ seed: 5, disturbances: { misidentified: [{ star: 2, measured }] } });
    expectTruth(night, 4);
    const found = night.solution.findings.filter(({ kind }) => kind === 'star-rejected');
    expect(found).toHaveLength(1);
    expect(found[0]?.reason).toContain('Star S3');
  });

  it('a bank of cloud is found as a run of frames', () => {
    const clouds = [{ from_hours: -2, to_hours: 0.5, depth: 0.4, unevenness: 0.2 }];
    const night = solved({ seed: 6, disturbances: { clouds } });
    expectTruth(night, 4);
    expect(night.solution.findings.map(({ kind }) => kind)).toContain('run-rejected');
  });

  it('with one star a frame it drops the scatter of frames and says so', () => {
    const { solution } = solved({ seed: 7, frames: 40, starsPerFrame: 1, fields: 40 });
    expect(onlyBand(solution).scatter.frame).toBeNull();
    expect(solution.findings.map(({ kind }) => kind)).toContain('frame-scatter-dropped');
  });

  it.each([
    ['airmass-range', 'extinction', { airmass: [1.2, 1.3] }],
    ['colour-range', 'colourTerm', { colour: [0.5, 0.6] }],
    ['too-few-frames', 'extinction', { frames: 2 }],
    ['too-few-stars', 'colourTerm', { fields: 1, starsPerFrame: 1 }],
    ['too-few-observations', null, { frames: 3, starsPerFrame: 1 }],
  ] as const)('%s: no number is given, and the finding names %s', (kind, coefficient, change) => {
    const { solution, observations } = solved(change);
    const band = onlyBand(solution);
    expect(solution.outcome).toBe('undetermined');
    expect(band.coefficients.map(({ value, error, interval95 }) => [value, error, interval95])).toEqual(
      band.coefficients.map(() => [null, null, null]),
    );
    const found = solution.findings.find((finding) => finding.kind === kind);
    expect(found?.weight).toBe('stop');
    expect(found?.coefficient).toBe(coefficient);
    expect(found?.remedy).not.toBe('');
    expect(band.nUsed).toBe(observations.band.length);
    expect(solution.observations.residual.every(Number.isNaN)).toBe(true);
  });
});
