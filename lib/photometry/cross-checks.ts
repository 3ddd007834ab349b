/**
 * Extinction and colour term as they were found before computers, from the rows that a fit used: something that is
 * right by itself must come out of them too, if with a larger error. None of them knows the mixed model.
 *
 * | check | from | line through the origin or not |
 * |---|---|---|
 * | Bouguer line | all rows of a star whose airmass spans 0.5 or more | y = a + k′·X |
 * | high–low pairs | the lowest and the highest frame, then the next ones inward, while their airmasses differ by 0.5; on each pair of frames the two stars closest in colour | Δy = k′·ΔX |
 * | colour pairs | on each frame the bluest and the reddest star, when their colours differ by 0.5 | Δy = T·ΔC |
 *
 * y is m_inst − M − fixed terms, less the fitted second-order extinction where it is sought; of colour terms a high–low
 * pair loses T·ΔC with the fitted T. Errors come from the scatter about the line; published errors of stars that return
 * in several pairs are not in them.
 *
 * Sources: Hardie 1962, in Astronomical Techniques, chapter 8; choice of pairs and limits: our own rules.
 */
import { SimpleLinearRegression } from 'ml-regression';
import { fitLeastSquares } from '@/lib/numerics/least-squares';
import { type BandProblem } from './band-problem';
import { type NightFit } from './fit-band';
import { type CoefficientName } from './fit-model';
import { type BandSolution } from './night-solution';

type CrossChecks = BandSolution['crossChecks'];

/** Range of airmass that a line or a pair needs. Our own rule [airmass] */
const wideAirmass = 0.5;
/** Difference of colour that a pair of colours needs, and that a high–low pair may not have. Our own rules [mag] */
const wideColour = 0.5;
const sameColour = 0.2;
const fewestRows = 3;

interface Point {
  readonly row: number;
  readonly x: number;
  readonly y: number;
}

/** Makes the cross-checks of a night.
 * @param problem - of the band
 * @param fit - of the night
 * @returns Bouguer lines by star, high–low pairs and colour pairs
 * @accuracy rounding; the checks themselves are as good as their errors say, published errors aside
 * @source Hardie 1962, in Astronomical Techniques, chapter 8 */
export function crossCheck(problem: BandProblem, fit: NightFit): CrossChecks {
  const valueOf = (name: CoefficientName): number => {
    const at = problem.sought.findIndex((one) => one.name === name);
    return at < 0 ? 0 : fit.coefficients[at]!;
  };
  const secondOrder = valueOf('secondOrderExtinction');
  const points = Array.from(fit.rows, (row): Point => {
    const x = problem.airmass[row]!;
    const colour = Number.isFinite(problem.colour[row]!) ? problem.colour[row]! : 0;
    return { row, x, y: problem.response[row]! - secondOrder * x * colour };
  });
  const stars = grouped(points, problem.star);
  const frames = grouped(points, problem.frame).map(([, rows]) => rows);
  return {
    bouguer: stars.flatMap(([star, rows]) => bouguerLine(star, rows)),
    highLow: highLowPairs(problem, frames, valueOf('colourTerm')),
    colourPairs: colourPairs(problem, frames),
  };
}

function grouped(points: readonly Point[], of: Int32Array): readonly (readonly [number, readonly Point[]])[] {
  const groups = new Map<number, Point[]>();
  for (const point of points) {
    const known = groups.get(of[point.row]!);
    if (known === undefined) groups.set(of[point.row]!, [point]);
    else known.push(point);
  }
  return [...groups].sort(([a], [b]) => a - b);
}

const mean = (values: readonly number[]): number => values.reduce((sum, x) => sum + x, 0) / values.length;
const spread = (values: readonly number[], centre: number): number =>
  Math.sqrt(values.reduce((sum, x) => sum + (x - centre) ** 2, 0) / values.length);

function bouguerLine(star: number, points: readonly Point[]): CrossChecks['bouguer'] {
  const xs = points.map(({ x }) => x);
  if (points.length < fewestRows || Math.max(...xs) - Math.min(...xs) < wideAirmass) return [];
  const ys = points.map(({ y }) => y);
  const [meanX, meanY] = [mean(xs), mean(ys)];
  const [sdX, sdY] = [spread(xs, meanX), spread(ys, meanY)];
  if (sdY === 0) return [{ star, extinction: 0, error: 0, n: points.length }];
  // Centred and scaled: the library squares its input, and loses digits of what lies far from zero.
  const line = new SimpleLinearRegression(
    xs.map((x) => (x - meanX) / sdX),
    ys.map((y) => (y - meanY) / sdY),
  );
  const extinction = (line.slope * sdY) / sdX;
  const left = points.reduce((sum, { x, y }) => sum + (y - meanY - extinction * (x - meanX)) ** 2, 0);
  const error = Math.sqrt(left / (points.length - 2) / points.length) / sdX;
  return [{ star, extinction, error, n: points.length }];
}

/** Slope of a line through the origin. Null for fewer than two pairs, which leave no scatter to tell the error from. */
function slopeOf(
  pairs: readonly { readonly dx: number; readonly dy: number }[],
): { readonly slope: number; readonly error: number; readonly n: number } | null {
  const n = pairs.length;
  if (n < 2) return null;
  const line = fitLeastSquares({
    design: Float64Array.from(pairs, ({ dx }) => dx),
    columns: 1,
    response: Float64Array.from(pairs, ({ dy }) => dy),
    sigma: new Float64Array(n).fill(1),
  });
  if (line.kind === 'undetermined') return null;
  const error = Math.sqrt((line.covariance[0]! * line.chi2) / line.degreesOfFreedom);
  return { slope: line.coefficients[0]!, error, n };
}

function highLowPairs(
  { colour }: BandProblem,
  frames: readonly (readonly Point[])[],
  colourTerm: number,
): CrossChecks['highLow'] {
  const height = (points: readonly Point[]): number => mean(points.map(({ x }) => x));
  const sorted = [...frames].sort((a, b) => height(a) - height(b));
  const pairs: { dx: number; dy: number }[] = [];
  for (let low = 0, high = sorted.length - 1; low < high; low += 1, high -= 1) {
    let best: { a: Point; b: Point; apart: number } | null = null;
    for (const a of sorted[low]!) {
      for (const b of sorted[high]!) {
        const apart = Math.abs(colour[a.row]! - colour[b.row]!);
        if (apart <= (best?.apart ?? sameColour) && b.x - a.x >= wideAirmass) best = { a, b, apart };
      }
    }
    if (best === null) continue;
    const { a, b } = best;
    pairs.push({ dx: b.x - a.x, dy: b.y - a.y - colourTerm * (colour[b.row]! - colour[a.row]!) });
  }
  const line = slopeOf(pairs);
  return line === null ? null : { extinction: line.slope, error: line.error, n: line.n };
}

function colourPairs(
  { colour }: BandProblem,
  frames: readonly (readonly Point[])[],
): CrossChecks['colourPairs'] {
  const pairs = frames.flatMap((points) => {
    const known = points.filter(({ row }) => Number.isFinite(colour[row]!));
    const sorted = [...known].sort((a, b) => colour[a.row]! - colour[b.row]!);
    const [blue, red] = [sorted[0], sorted.at(-1)];
    if (blue === undefined || red === undefined) return [];
    const dx = colour[red.row]! - colour[blue.row]!;
    return dx < wideColour ? [] : [{ dx, dy: red.y - blue.y }];
  });
  const line = slopeOf(pairs);
  return line === null ? null : { colourTerm: line.slope, error: line.error, n: line.n };
}
