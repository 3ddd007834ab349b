/**
 * Variance components of a mixed model by restricted maximum likelihood (Patterson and Thompson 1971, Biometrika 58, 545).
 * Sought is the minimum over θ = (σ_o², σ_b²), each ≥ 0, of
 *
 *     criterion(θ) = log |V| + log |X′V⁻¹X| + r′V⁻¹r
 *
 * which is −2 log likelihood without its constants. Its gradient is tr(P V_k) − y′P V_k P y; the matrix y′P V_j P V_k P y
 * (average information; Gilmour, Thompson and Cullis 1995, Biometrics 51, 1440) stands in for the Hessian. The minimum
 * of nine starts, bounds included, is improved by Newton steps that stay within the bounds (Bertsekas 1982, SIAM Journal
 * on Control and Optimization 20, 221).
 */
import { fitWhitened, type LinearPart, type WhitenedFit } from './generalised-least-squares';
import { applyQTransposed, factorQr, inverseR } from './householder-qr';
import { type Components, factorNoise, type Noise, type NoiseLayout, solveNoise } from './mixed-noise';
import { applyProjection, type Projection, projectNoise, spreadBlockSums } from './noise-traces';

/** A component is estimated, or held at a standard deviation that the caller knows. */
export type ScatterRule = { readonly kind: 'estimate' } | { readonly kind: 'hold'; readonly sigma: number };

export interface Scatter {
  /** Standard deviation of the component [unit of the response]. */
  readonly sigma: number;
  /** Standard error of sigma, from the average information; null unless the state is 'estimated'. */
  readonly errSigma: number | null;
  /** 'at-zero': the data ask for none. 'not-separable': no block has two rows, so that the observations' scatter holds
   * both. */
  readonly state: 'estimated' | 'at-zero' | 'held' | 'not-separable';
}

export interface Termination {
  /** 'converged': the gradient is zero within rounding or pushes against a bound. 'fixed': nothing to estimate.
   * 'no-freedom': as many coefficients as rows; every component to be estimated is taken as zero.
   * 'stalled': no step lowers the criterion, though the gradient asks for one. 'iteration-limit': as it says. */
  readonly reason: 'converged' | 'fixed' | 'no-freedom' | 'stalled' | 'iteration-limit';
  /** Newton steps taken. */
  readonly iterations: number;
}

export interface RemlEstimate {
  readonly components: Components;
  /** Where the search ended, before any refinement: the next one, for nearly the same rows, may begin there. */
  readonly near: Components;
  readonly observation: Scatter;
  readonly block: Scatter;
  readonly criterion: number;
  /** Covariance of (σ_o², σ_b²), row-major, shape (2, 2) [unit⁴]; zero for a component that is not estimated inside. */
  readonly componentCovariance: Float64Array;
  readonly termination: Termination;
}

const maxIterations = 60;
/** Gradient in units of its own standard deviation, below which it is zero. [1] */
const gradientTolerance = 1e-7;
/** Share of the residual scatter that stands for zero where a row has no error of its own. [1] */
const floorShare = 1e-6;

type Pair = readonly [number, number];

/** Scatter of the response about its unweighted fit. */
function crudeScatter(rows: number, { design, columns, response }: LinearPart): number {
  const qr = factorQr(design, rows, columns);
  const rest = Float64Array.from(response);
  applyQTransposed(qr, rest);
  let sum = 0;
  for (let i = qr.rank; i < rows; i += 1) sum += rest[i]! * rest[i]!;
  return Math.sqrt(sum / Math.max(1, rows - qr.rank));
}

interface Problem {
  readonly layout: NoiseLayout;
  readonly part: LinearPart;
  readonly free: readonly [boolean, boolean];
  readonly least: Pair;
}

const asComponents = (theta: Pair): Components => ({ observation: theta[0], block: theta[1] });

/** The fit at given components. */
interface Point {
  readonly theta: Pair;
  readonly noise: Noise;
  readonly fit: WhitenedFit;
  readonly criterion: number;
}

function pointAt({ layout, part }: Problem, theta: Pair): Point {
  const noise = factorNoise(layout, asComponents(theta));
  const fit = fitWhitened(noise, part);
  return { theta, noise, fit, criterion: noise.logDet + fit.logDetInformation + fit.chi2 };
}

interface Derivatives {
  readonly gradient: Pair;
  /** (oo, ob, bb) of the average information of the criterion. */
  readonly information: readonly [number, number, number];
}

function derivativesAt({ part }: Problem, { noise, fit }: Point): Derivatives {
  const projection = projectNoise(noise, part.design, inverseR(fit.qr), fit.qr.rank);
  return derivativesOf(projection, projection, solveNoise(noise, residuals(part, fit.coefficients)));
}

interface Traces {
  readonly diagonal: Float64Array;
  readonly blockSums: Float64Array;
}

function derivativesOf(
  projection: Projection,
  { diagonal, blockSums }: Traces,
  v: Float64Array,
): Derivatives {
  const spread = spreadBlockSums(projection.noise, v);
  const throughOwn = applyProjection(projection, v);
  const throughBlocks = applyProjection(projection, spread);
  const dot = (a: Float64Array, b: Float64Array): number => a.reduce((sum, x, i) => sum + x * b[i]!, 0);
  const total = (a: Float64Array): number => a.reduce((sum, x) => sum + x, 0);
  return {
    gradient: [total(diagonal) - dot(v, v), total(blockSums) - dot(v, spread)],
    information: [dot(v, throughOwn), dot(v, throughBlocks), dot(spread, throughBlocks)],
  };
}

/** y − X β. */
function residuals(part: LinearPart, coefficients: Float64Array): Float64Array {
  const rest = Float64Array.from(part.response);
  const rows = rest.length;
  for (let j = 0; j < part.columns; j += 1) {
    const value = coefficients[j]!;
    if (value !== 0) for (let i = 0; i < rows; i += 1) rest[i]! -= value * part.design[j * rows + i]!;
  }
  return rest;
}

/** The Newton step of the components that may move; a diagonal one where the information is not positive definite. */
function newtonStep({ gradient, information }: Derivatives, moves: readonly [boolean, boolean]): Pair {
  const [g0, g1] = gradient;
  const [oo, ob, bb] = information;
  if (moves[0] && moves[1]) {
    const determinant = oo * bb - ob * ob;
    if (determinant > 1e-10 * oo * bb)
      return [-(bb * g0 - ob * g1) / determinant, -(oo * g1 - ob * g0) / determinant];
  }
  return [moves[0] && oo > 0 ? -g0 / oo : 0, moves[1] && bb > 0 ? -g1 / bb : 0];
}

interface Descent {
  readonly point: Point;
  readonly slope: Derivatives;
  readonly termination: Termination;
}

function descend(problem: Problem, start: Point): Descent {
  const { free, least } = problem;
  let point = start;
  for (let iterations = 0; ; iterations += 1) {
    const slope = derivativesAt(problem, point);
    if (iterations === maxIterations) {
      return { point, slope, termination: { reason: 'iteration-limit', iterations } };
    }
    const { theta, criterion } = point;
    const moves = [0, 1].map(
      (k) => free[k]! && !(theta[k]! <= least[k]! && slope.gradient[k]! >= 0),
    ) as unknown as readonly [boolean, boolean];
    const size = [slope.information[0], slope.information[2]];
    const flat = [0, 1].every(
      (k) => !moves[k] || Math.abs(slope.gradient[k]!) <= gradientTolerance * Math.sqrt(Math.abs(size[k]!)),
    );
    if (flat) return { point, slope, termination: { reason: 'converged', iterations } };
    const step = newtonStep(slope, moves);
    const next = lineSearch(problem, { theta, criterion, step, gradient: slope.gradient });
    if (next === null) {
      // Where the promised gain drowns in the criterion's rounding there is nothing left to find.
      const promised = -(step[0] * slope.gradient[0] + step[1] * slope.gradient[1]);
      const reason = promised <= 1e-9 * (1 + Math.abs(criterion)) ? 'converged' : 'stalled';
      return { point, slope, termination: { reason, iterations } };
    }
    point = next;
  }
}

interface Line {
  readonly theta: Pair;
  readonly criterion: number;
  readonly step: Pair;
  readonly gradient: Pair;
}

/** Halves the step, bent along the bounds, until the criterion falls as the gradient promised, to a ten-thousandth. */
function lineSearch(problem: Problem, line: Line): Point | null {
  const { theta, criterion, step, gradient } = line;
  for (let scale = 1; scale > 1e-9; scale /= 2) {
    const next: Pair = [
      Math.max(problem.least[0], theta[0] + scale * step[0]),
      Math.max(problem.least[1], theta[1] + scale * step[1]),
    ];
    const moved: Pair = [next[0] - theta[0], next[1] - theta[1]];
    if (moved[0] === 0 && moved[1] === 0) return null;
    const promised = gradient[0] * moved[0] + gradient[1] * moved[1];
    if (!(promised < 0)) continue;
    const point = pointAt(problem, next);
    if (point.criterion <= criterion + 1e-4 * promised) return point;
  }
  return null;
}

/** Variance of the two components from the average information, for those that are estimated and not at their bound. */
function componentCovariance(
  { information }: Derivatives,
  inside: readonly [boolean, boolean],
): Float64Array {
  const [oo, ob, bb] = information;
  // The criterion is twice the negative log likelihood, so its information counts double.
  if (inside[0] && inside[1]) {
    const determinant = oo * bb - ob * ob;
    if (determinant > 1e-10 * oo * bb) {
      return Float64Array.of(bb, -ob, -ob, oo).map((x) => (2 * x) / determinant);
    }
  }
  return Float64Array.of(inside[0] ? 2 / oo : 0, 0, 0, inside[1] ? 2 / bb : 0);
}

/** Estimates σ_o² and σ_b² by REML.
 * @param layout - who shares what
 * @param part - design of full column rank, priors included; response [unit]
 * @param rules - what to estimate and what to hold, [observation, block] [unit]
 * @param near - where to begin, from a fit of nearly the same rows; null for nine starts [unit²]
 * @returns components, their standard errors, the criterion at the minimum, and how the search ended
 * @throws {RangeError} when a held scatter leaves a row without any variance
 * @accuracy criterion 1e-8, components 1e-6 relative, against a dense minimisation; of several minima the one that the
 * best of nine starts, or the near one, leads to
 * @source Patterson and Thompson 1971, Biometrika 58, 545; Gilmour, Thompson and Cullis 1995, Biometrics 51, 1440 */
export function estimateComponents(
  layout: NoiseLayout,
  part: LinearPart,
  rules: readonly [ScatterRule, ScatterRule],
  near: Components | null,
): RemlEstimate {
  let shared = false;
  for (let b = 0; b + 1 < layout.blockStart.length; b += 1) {
    shared ||= layout.blockStart[b + 1]! - layout.blockStart[b]! > 1;
  }
  const separable = layout.hasBlocks && shared;
  const hasFreedom = layout.rows + part.priors.length > part.columns;
  const held: Pair = [
    rules[0].kind === 'hold' ? rules[0].sigma ** 2 : 0,
    rules[1].kind === 'hold' && layout.hasBlocks ? rules[1].sigma ** 2 : 0,
  ];
  const free: readonly [boolean, boolean] = [
    rules[0].kind === 'estimate' && hasFreedom,
    rules[1].kind === 'estimate' && separable && hasFreedom,
  ];
  const crude = crudeScatter(layout.rows, part);
  const bare = layout.knownVariance.some((variance) => variance === 0);
  // Without any residual there is no scale but the response's own.
  const size = part.response.reduce((most, y) => Math.max(most, Math.abs(y)), 0) || 1;
  const scale = Math.max(crude, 1e-12 * size);
  const least: Pair = [free[0] && bare ? (floorShare * scale) ** 2 : held[0], held[1]];
  const problem: Problem = { layout, part, free, least };
  const descent = free[0] || free[1] ? descend(problem, bestStart(problem, scale, near)) : null;
  const point = descent === null ? pointAt(problem, least) : descent.point;
  const { theta } = point;
  const inside = [0, 1].map((k) => free[k]! && theta[k]! > least[k]!) as unknown as readonly [
    boolean,
    boolean,
  ];
  const covariance =
    descent !== null && (inside[0] || inside[1])
      ? componentCovariance(descent.slope, inside)
      : new Float64Array(4);
  const scatter = (k: 0 | 1, state: Scatter['state']): Scatter => {
    const sigma = Math.sqrt(theta[k]);
    return {
      sigma,
      errSigma: state === 'estimated' ? Math.sqrt(covariance[3 * k]!) / (2 * sigma) : null,
      state,
    };
  };
  const stateOf = (k: 0 | 1): Scatter['state'] =>
    rules[k].kind === 'hold' ? 'held' : inside[k] ? 'estimated' : 'at-zero';
  return {
    components: asComponents(theta),
    near: asComponents(theta),
    observation: scatter(0, stateOf(0)),
    block: scatter(1, rules[1].kind === 'estimate' && !separable ? 'not-separable' : stateOf(1)),
    criterion: point.criterion,
    componentCovariance: covariance,
    termination: descent?.termination ?? { reason: hasFreedom ? 'fixed' : 'no-freedom', iterations: 0 },
  };
}

/** The best of nine starts. A near one stands for them, unless it lies at a bound: what held it there may be gone. */
function bestStart(problem: Problem, scale: number, near: Components | null): Point {
  const { free, least } = problem;
  if (near !== null) {
    const theta: Pair = [free[0] ? near.observation : least[0], free[1] ? near.block : least[1]];
    if ([0, 1].every((k) => !free[k] || theta[k]! > least[k]!)) return pointAt(problem, theta);
  }
  const startsOf = (k: 0 | 1): number[] =>
    free[k] ? [least[k], (0.3 * scale) ** 2, scale ** 2] : [least[k]];
  let best = pointAt(problem, least);
  for (const observation of startsOf(0)) {
    for (const block of startsOf(1)) {
      const point = pointAt(problem, [observation, block]);
      if (point.criterion < best.criterion) best = point;
    }
  }
  return best;
}

interface JointTraces extends Traces {
  readonly alone: Projection;
}

/** One Newton step of the components in a likelihood that knows more than the group, kept within the bounds. Steps are
 * held to half of a component, as there is no criterion to check them by.
 * @param estimate - where to start
 * @param sense - the joint projection over the group's rows, and the group's own
 * @param v - V⁻¹(y − Xβ) over the group's rows, shape (n) [1 per unit]
 * @returns the moved components; components that are held or not separable, or at zero and better so, stay
 * @accuracy leaves a gradient of second order in what it found
 * @source Gilmour, Thompson and Cullis 1995, Biometrics 51, 1440 */
export function refineComponents(estimate: RemlEstimate, sense: JointTraces, v: Float64Array): RemlEstimate {
  const slope = derivativesOf(sense.alone, sense, v);
  const theta: Pair = [estimate.components.observation, estimate.components.block];
  const scatters = [estimate.observation, estimate.block] as const;
  const moves = [0, 1].map((k) => scatters[k]!.state === 'estimated') as unknown as readonly [
    boolean,
    boolean,
  ];
  const step = newtonStep(slope, moves);
  const next = theta.map((value, k) => value + Math.max(-value / 2, Math.min(value / 2, step[k]!)));
  const moved = (k: 0 | 1): Scatter => {
    const sigma = Math.sqrt(next[k]!);
    const { errSigma, state } = scatters[k];
    // The variance keeps its standard error, 2 σ err_σ.
    return { sigma, errSigma: errSigma === null ? null : (errSigma * scatters[k].sigma) / sigma, state };
  };
  return {
    ...estimate,
    components: { observation: next[0]!, block: next[1]! },
    observation: moves[0] ? moved(0) : estimate.observation,
    block: moves[1] ? moved(1) : estimate.block,
  };
}
