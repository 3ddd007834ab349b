/**
 * Which rows of a band are believed. From a robust start (robust-start.ts) the mixed model is fitted to the rows that
 * lie within the limit; then every row, in the fit or not, is compared with its prediction by the fit without it, and
 * every star, frame and run of frames as a whole (rejection-structures.ts). What stands within the limits is taken in,
 * what does not is taken out, until nothing changes: what is rejected at the end is beyond the limit of the final fit,
 * and what is used is within it, whatever the start was.
 *
 * The limit of a single row is that number of normal standard deviations which the model names, widened to the same
 * probability of Student's t for the degrees of freedom that there are. At 4 it is passed by 1 in 16,000 good rows, and
 * cutting a normal distribution there lowers its standard deviation by 0.05 %: the scatter is not biased.
 *
 * Sources: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2 (deletion residuals); taking rows
 * back in by their prediction: Hadi and Simonoff 1993, Journal of the American Statistical Association 88, 1264.
 */
import { type Prior } from '@/lib/numerics/generalised-least-squares';
import { median, scaleByMad } from '@/lib/numerics/robust';
import { studentTLimit } from '@/lib/numerics/student-t';
import { colourCoefficients, designOf, nightCoefficients, type BandProblem } from './band-problem';
import { rangeOf } from './determination';
import { fitBand, modelPriors, rowsByNight, type BandFit, type NightFit } from './fit-band';
import { type FitLimits } from './fit-model';
import { deletionOf, pick, predictionOf, viewNight, type Shift } from './night-view';
import { findStructures, normalTail, type Structure } from './rejection-structures';
import { startRobustly, type RobustStart } from './robust-start';
import { overrules } from './standard-observations';

export type RowVerdict =
  | { readonly kind: 'believed' }
  | ({ readonly kind: 'outlier'; readonly limit: number } & Shift)
  | { readonly kind: 'structure'; readonly structure: Structure };

export interface Rejection {
  readonly fit: BandFit;
  /** Rows in the fit, ascending. */
  readonly used: Int32Array;
  /** What the fit says of each row, whatever a person decided on it; null for rows that were not asked. */
  readonly verdicts: readonly (RowVerdict | null)[];
  readonly structures: readonly Structure[];
  /** Of the robust start, shape (n); NaN without one. */
  readonly weights: Float64Array;
  readonly converged: boolean;
}

export interface RejectionOptions {
  readonly limits: FitLimits;
  /** Of the robust start. */
  readonly seed: number;
}

const maxRounds = 12;
/** From this round on rows only leave: two rows that push each other in and out would never end. */
const onlyOutFrom = 8;

const believed: RowVerdict = { kind: 'believed' };

/** Fits a band to the rows that agree with each other.
 * @param problem - of the band
 * @param rows - rows of the nights that are fitted, ascending, shape (m) [1]
 * @param options - limits and seed
 * @returns the fit and what became of every row
 * @accuracy on clean nights less than 1 in 1000 rows is rejected
 * @source see the head */
export function fitBelieved(problem: BandProblem, rows: Int32Array, options: RejectionOptions): Rejection {
  const usable = rows.filter((row) => problem.overrule[row] !== overrules.keepOut);
  const { start, weights } = startingRows(problem, usable, options);
  let used = start;
  let fit = fitBand(problem, used, null);
  // Without the rows that the start rejects a coefficient may hang in the air; then all of them begin.
  if (fit.kind === 'undetermined' && used.length < usable.length) {
    used = usable;
    fit = fitBand(problem, used, null);
  }
  for (let round = 0; ; round += 1) {
    const judged = fit.kind === 'determined' ? judge(problem, rows, fit.nights, options.limits) : null;
    if (judged === null) return { fit, used, ...unjudged(problem), weights, converged: true };
    const next = believedRows(problem, usable, judged.verdicts, { used, onlyOut: round >= onlyOutFrom });
    const isSame = next.length === used.length && next.every((row, i) => row === used[i]);
    if (isSame || round === maxRounds) return { fit, used, ...judged, weights, converged: isSame };
    const refit = fitBand(problem, next, fit);
    if (refit.kind === 'undetermined') return { fit: refit, used: next, ...judged, weights, converged: true };
    used = next;
    fit = refit;
  }
}

const unjudged = ({ observation }: BandProblem): Pick<Rejection, 'verdicts' | 'structures'> => ({
  verdicts: Array.from(observation, () => null),
  structures: [],
});

/** Rows within the limit of the robust start of their night. Of several nights each starts by itself; a night whose
 * colours say too little takes what the others found of the shared coefficients. */
function startingRows(
  problem: BandProblem,
  usable: Int32Array,
  { limits, seed }: RejectionOptions,
): { readonly start: Int32Array; readonly weights: Float64Array } {
  const startOf = (rows: Int32Array, priors: readonly Prior[]): RobustStart | null =>
    startRobustly({
      design: designOf(problem, rows),
      columns: problem.sought.length,
      response: pick(problem.response, rows),
      rowSigma: Float64Array.from(rows, (row) =>
        Math.hypot(problem.sigma[row]!, problem.starSigma[problem.star[row]!]!),
      ),
      priors,
      bisquare: limits.bisquare,
      seed,
    });
  const nights = rowsByNight(problem, usable);
  const priors = modelPriors(problem);
  const isFull = nights.map(({ rows }) => {
    const { min, max } = rangeOf(problem.colour, rows) ?? { min: 0, max: 0 };
    return nights.length === 1 || max - min >= limits.colourRange;
  });
  const starts = nights.map(({ rows }, k) => (isFull[k] ? startOf(rows, priors) : null));
  const borrowed = [...priors, ...sharedPriors(problem, starts)];
  const weights = new Float64Array(problem.observation.length).fill(Number.NaN);
  const kept: number[] = [];
  for (const [k, { rows }] of nights.entries()) {
    const robust = starts[k] ?? (isFull[k] ? null : startOf(rows, borrowed));
    const isNear = Array.from(
      rows,
      (_, i) => robust === null || Math.abs(robust.standardised[i]!) <= limits.rejectSigmas,
    );
    const [frames, stars] = [problem.frame, problem.star].map((of) => shareNear(of, rows, isNear));
    for (let i = 0; i < rows.length; i += 1) {
      const row = rows[i]!;
      if (robust !== null) weights[row] = robust.weights[i]!;
      const isWhole = frames!.get(problem.frame[row]!)! >= half && stars!.get(problem.star[row]!)! >= half;
      if ((isNear[i]! && isWhole) || problem.overrule[row] === overrules.keepIn) kept.push(row);
    }
  }
  return { start: Int32Array.from(kept).sort(), weights };
}

/**
 * Rows of the next fit. What is outside comes in only with most of its frame and of its star: a few rows of a clouded
 * frame alone would bring in the others, as at the start.
 */
function believedRows(
  problem: BandProblem,
  usable: Int32Array,
  verdicts: readonly (RowVerdict | null)[],
  { used, onlyOut }: { readonly used: Int32Array; readonly onlyOut: boolean },
): Int32Array {
  const inFit = new Set(used);
  const isBelieved = Array.from(usable, (row) => verdicts[row]?.kind === 'believed');
  const [frames, stars] = [problem.frame, problem.star].map((of) => shareNear(of, usable, isBelieved));
  return usable.filter((row, i) => {
    if (problem.overrule[row] === overrules.keepIn) return true;
    if (!isBelieved[i]! || inFit.has(row)) return isBelieved[i]!;
    return !onlyOut && frames!.get(problem.frame[row]!)! >= half && stars!.get(problem.star[row]!)! >= half;
  });
}

const half = 0.5;

/** Share of the rows of each frame, or star, that lie near. */
function shareNear(
  of: Int32Array,
  rows: Int32Array,
  isNear: readonly boolean[],
): ReadonlyMap<number, number> {
  const counts = new Map<number, { near: number; all: number }>();
  for (let i = 0; i < rows.length; i += 1) {
    const count = counts.get(of[rows[i]!]!) ?? { near: 0, all: 0 };
    count.all += 1;
    if (isNear[i]!) count.near += 1;
    counts.set(of[rows[i]!]!, count);
  }
  return new Map([...counts].map(([place, { near, all }]) => [place, near / all]));
}

/** Size of coefficients in colour where nothing at all is known of them. Common practice, no source. */
const usualColourTerm = 0.1;
/** To so much the starts of single nights are trusted at best. Our own rule. */
const leastSpread = 0.01;

/** The shared coefficients as the starts of the nights found them, for nights that cannot find them. */
function sharedPriors({ sought }: BandProblem, starts: readonly (RobustStart | null)[]): readonly Prior[] {
  return sought.flatMap(({ name, term }, column) => {
    if (term.status === 'prior' || !colourCoefficients.includes(name)) return [];
    const values = starts.flatMap((start) => (start === null ? [] : [start.coefficients[column]!]));
    if (values.length === 0) return [{ column, value: 0, sigma: usualColourTerm }];
    const value = median(values);
    return [{ column, value, sigma: Math.max(leastSpread, scaleByMad(values, value)) }];
  });
}

function judge(
  problem: BandProblem,
  rows: Int32Array,
  nights: readonly NightFit[],
  limits: FitLimits,
): Pick<Rejection, 'verdicts' | 'structures'> | null {
  const verdicts: (RowVerdict | null)[] = Array.from(problem.observation, () => null);
  const all: Structure[] = [];
  const rowsOf = new Map(rowsByNight(problem, rows).map((one) => [one.night, one.rows] as const));
  for (const night of nights) {
    const view = viewNight(problem, night.rows, night.components, night.priors);
    if (view === null) return null;
    const own = rowsOf.get(night.night) ?? new Int32Array(0);
    const dofObservation = Math.max(1, night.rows.length - problem.sought.length);
    const limit = studentTLimit(normalTail(limits.rejectSigmas), dofObservation);
    const { components, dofFrame } = expectedScatter(problem, night);
    const structures = findStructures(
      viewNight(problem, night.rows, components, night.priors) ?? view,
      own.filter((row) => problem.overrule[row] === overrules.none),
      { rejectSigmas: limits.rejectSigmas, dofObservation, dofFrame },
    );
    all.push(...structures);
    const places = new Map(Array.from(night.rows, (row, i) => [row, i] as const));
    for (const row of own) {
      const place = places.get(row);
      const difference = place === undefined ? predictionOf(view, row) : deletionOf(view, place);
      const isNear = Math.abs(difference.shift) <= limit * difference.error;
      verdicts[row] = isNear ? believed : { kind: 'outlier', limit, ...difference };
    }
    for (const structure of structures) {
      for (const row of structure.rows) verdicts[row] = { kind: 'structure', structure };
    }
  }
  return { verdicts, structures: all };
}

/** Scatter of frames in a good night [mag], and the degrees of freedom that it counts for. Common practice, no source. */
const goodFrames = { scatter: 0.005, degrees: 4 } as const;

/**
 * What frames are expected to scatter: as they do in the fit, joined with what is known of good nights as the degrees of
 * freedom weigh them. From five frames alone Student's t would allow a frame 30 standard errors, and a bank of cloud would
 * be taken for scatter; with many frames nothing but the fit counts.
 */
function expectedScatter(
  problem: BandProblem,
  night: NightFit,
): { readonly components: NightFit['components']; readonly dofFrame: number } {
  const own = frameDegrees(problem, night);
  if (!night.hasFrameScatter) return { components: night.components, dofFrame: own };
  const dofFrame = own + goodFrames.degrees;
  const block = (own * night.components.block + goodFrames.degrees * goodFrames.scatter ** 2) / dofFrame;
  return { components: { ...night.components, block }, dofFrame };
}

/** Degrees of freedom of the scatter of frames: frames less the coefficients that only differ between frames. */
function frameDegrees(problem: BandProblem, { rows, hasFrameScatter }: NightFit): number {
  if (!hasFrameScatter) return Math.max(1, rows.length - problem.sought.length);
  const frames = new Set(Array.from(rows, (row) => problem.frame[row]!)).size;
  const between = problem.sought.filter(
    ({ name, term }) => term.status === 'free' && nightCoefficients.includes(name),
  ).length;
  return Math.max(1, frames - between);
}
