import { beforeAll, describe, expect, it } from 'vitest';
import { fitLeastSquares, type LeastSquaresFit } from '@/lib/numerics/least-squares';
import { fitMixedModel, type MixedModelFit } from '@/lib/numerics/mixed-model';
import { usualBandModel, usualLimits } from '@/lib/photometry/fit-model';
import { type BandSolution, type NightSolution } from '@/lib/photometry/night-solution';
import { solveNights } from '@/lib/photometry/solve-nights';
import { expectWithin } from '@/tests/support/numbers';
import { standardNight } from '@/tests/support/standard-night';

/** What a solution says in closed forms, found again the long way: by fitting once more. */
const { observations } = standardNight({ seed: 31, frames: 18, starsPerFrame: 5, fields: 4 });
const n = observations.band.length;
const at = (column: ArrayLike<number>, o: number): number => column[o] ?? NaN;
const starOf = (o: number): number => at(observations.star, o);
const colour = (o: number): number => at(observations.standards.BV, starOf(o));
const difference = (o: number): number =>
  at(observations.instMag, o) - at(observations.standards.V, starOf(o));

/** The mixed model of some observations at held scatters; with one more column where asked for. */
function refit(
  rows: readonly number[],
  scatter: { observation: number; frame: number },
  column?: (o: number) => number,
): MixedModelFit {
  const floats = (of: (o: number) => number): Float64Array => Float64Array.from(rows, of);
  const outcome = fitMixedModel({
    response: floats(difference),
    design: Float64Array.from([
      ...rows.map(() => 1),
      ...rows.map((o) => at(observations.airmass, o)),
      ...rows.map(colour),
      ...(column ? rows.map(column) : []),
    ]),
    columns: column ? 4 : 3,
    sigma: floats((o) => at(observations.instErr, o)),
    subject: Int32Array.from(rows, starOf),
    subjectSigma: observations.standardErrors.V,
    block: Int32Array.from(rows, (o) => at(observations.frame, o)),
    observationScatter: { kind: 'hold', sigma: scatter.observation },
    blockScatter: { kind: 'hold', sigma: scatter.frame },
    priors: [],
  });
  if (outcome.kind === 'undetermined') throw new Error(outcome.reason);
  return outcome;
}

/** Least squares with equal errors. */
function plain(columns: readonly (readonly number[])[], response: readonly number[]): LeastSquaresFit {
  const outcome = fitLeastSquares({
    design: Float64Array.from(columns.flat()),
    columns: columns.length,
    response: Float64Array.from(response),
    sigma: new Float64Array(response.length).fill(1),
  });
  if (outcome.kind === 'undetermined') throw new Error('The line is not determined.');
  return outcome;
}

const slopeError = ({ covariance, chi2, degreesOfFreedom }: LeastSquaresFit): number =>
  Math.sqrt(((covariance.at(-1) ?? NaN) * chi2) / degreesOfFreedom);

/** Slope Σ xy / Σ x², and its error from the scatter about the line. */
function throughOrigin(pairs: readonly { dx: number; dy: number }[]): { slope: number; error: number } {
  const xx = pairs.reduce((sum, { dx }) => sum + dx * dx, 0);
  const slope = pairs.reduce((sum, { dx, dy }) => sum + dx * dy, 0) / xx;
  const left = pairs.reduce((sum, { dx, dy }) => sum + (dy - slope * dx) ** 2, 0);
  return { slope, error: Math.sqrt(left / (pairs.length - 1) / xx) };
}

const same = { absolute: 1e-9, unit: 'mag' } as const;

describe('what is said beside a fit', () => {
  let solution: NightSolution;
  let band: BandSolution;
  let used: readonly number[];
  let scatter: { observation: number; frame: number };
  beforeAll(() => {
    solution = solveNights(observations, { bands: [usualBandModel('V')], limits: usualLimits, seed: 5 });
    const [found] = solution.bands;
    if (found === undefined) throw new Error('There is a band.');
    band = found;
    scatter = { observation: found.scatter.observation ?? NaN, frame: found.scatter.frame ?? NaN };
    used = Array.from({ length: n }, (_, o) => o).filter((o) => solution.observations.used[o] === 1);
  });

  it('Cook’s distance of an observation is what the coefficients move by without it, in their own covariance', () => {
    const whole = refit(used, scatter);
    for (const left of used.filter((_, i) => i % 7 === 0)) {
      const without = refit(
        used.filter((o) => o !== left),
        scatter,
      );
      const moved = whole.coefficients.map((value, j) => value - (without.coefficients[j] ?? NaN));
      // C⁻¹ moved, as the coefficients of a regression of `moved` on the columns of C.
      const solved = plain(
        [0, 1, 2].map((j) => [0, 1, 2].map((k) => whole.covariance[3 * k + j] ?? NaN)),
        [...moved],
      ).coefficients;
      const distance = moved.reduce((sum, value, j) => sum + value * (solved[j] ?? NaN), 0) / 3;
      expect(distance).toBeGreaterThan(0);
      expectWithin((solution.observations.influence[left] ?? NaN) / distance, 1, {
        absolute: 1e-6,
        unit: `of observation ${left}`,
      });
    }
  });

  it('leave-one-star-out is how far each star lies from its prediction by all others', () => {
    const stars = [...new Set(used.map(starOf))];
    const shifts = stars.map((star) => {
      // The star's shift as one more column, 1 in its rows.
      const shifted = refit(used, scatter, (o) => Number(starOf(o) === star));
      return shifted.coefficients[3] ?? NaN;
    });
    const rms = Math.sqrt(shifts.reduce((sum, shift) => sum + shift * shift, 0) / shifts.length);
    expectWithin(band.leaveOneStarOut ?? NaN, rms, same);
  });

  it('a Bouguer line is the straight line through the observations of its star', () => {
    const wide = [...new Set(used.map(starOf))].filter((star) => {
      const airmasses = used.filter((o) => starOf(o) === star).map((o) => at(observations.airmass, o));
      return airmasses.length >= 3 && Math.max(...airmasses) - Math.min(...airmasses) >= 0.5;
    });
    expect(wide.length).toBeGreaterThan(3);
    expect(band.crossChecks.bouguer.map(({ star }) => star)).toEqual(wide.sort((a, b) => a - b));
    for (const { star, extinction, error, n: count } of band.crossChecks.bouguer) {
      const mine = used.filter((o) => starOf(o) === star);
      const line = plain(
        [mine.map(() => 1), mine.map((o) => at(observations.airmass, o))],
        mine.map(difference),
      );
      expect(count).toBe(mine.length);
      expectWithin(extinction, line.coefficients[1] ?? NaN, same);
      expectWithin(error, slopeError(line), same);
    }
  });

  it('high–low pairs give the extinction of a line through the origin, their colours taken off', () => {
    const term = band.coefficients.find(({ name }) => name === 'colourTerm')?.value ?? NaN;
    const frames = [...new Set(used.map((o) => at(observations.frame, o)))].map((frame) =>
      used.filter((o) => observations.frame[o] === frame),
    );
    const height = (rows: readonly number[]): number =>
      rows.reduce((sum, o) => sum + at(observations.airmass, o), 0) / rows.length;
    const byHeight = frames.sort((a, b) => height(a) - height(b));
    const pairs = byHeight.slice(0, Math.floor(byHeight.length / 2)).flatMap((high, k) => {
      const low = byHeight[byHeight.length - 1 - k] ?? [];
      const apart = (a: number, b: number): number => Math.abs(colour(a) - colour(b));
      const airmasses = (a: number, b: number): number =>
        at(observations.airmass, b) - at(observations.airmass, a);
      const fit = high
        .flatMap((a) => low.map((b) => [a, b] as const))
        .filter(([a, b]) => airmasses(a, b) >= 0.5 && apart(a, b) <= 0.2)
        .sort(([a, b], [c, d]) => apart(a, b) - apart(c, d));
      return fit.slice(0, 1).map(([a, b]) => ({
        dx: airmasses(a, b),
        dy: difference(b) - difference(a) - term * (colour(b) - colour(a)),
      }));
    });
    const line = throughOrigin(pairs);
    const found = band.crossChecks.highLow;
    expect(found?.n).toBe(pairs.length);
    expectWithin(found?.extinction ?? NaN, line.slope, same);
    expectWithin(found?.error ?? NaN, line.error, same);
  });

  it('colour pairs give the colour term of a line through the origin, from the bluest and the reddest star of a frame', () => {
    const frames = [...new Set(used.map((o) => at(observations.frame, o)))];
    const pairs = frames.flatMap((frame) => {
      const mine = used.filter((o) => observations.frame[o] === frame).sort((a, b) => colour(a) - colour(b));
      const [blue = NaN, red = NaN] = [mine[0], mine.at(-1)];
      const dx = colour(red) - colour(blue);
      return dx < 0.5 ? [] : [{ dx, dy: difference(red) - difference(blue) }];
    });
    expect(pairs.length).toBeGreaterThan(5);
    const line = throughOrigin(pairs);
    const found = band.crossChecks.colourPairs;
    expect(found?.n).toBe(pairs.length);
    expectWithin(found?.colourTerm ?? NaN, line.slope, same);
    expectWithin(found?.error ?? NaN, line.error, same);
  });
});
