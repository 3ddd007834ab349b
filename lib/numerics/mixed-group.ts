/**
 * One group of observations of a mixed model: what is given, what is refused, and what is said of it after the fit.
 * Symbols as in `mixed-model`.
 */
import { type Elimination } from './block-elimination';
import { type LinearPart, type Prior } from './generalised-least-squares';
import { senseGroup } from './group-sensitivity';
import { conditionNumber } from './householder-qr';
import {
  addLeverage,
  conditionalResiduals,
  deletionResiduals,
  degreesOfFreedom,
  predictBlocks,
  varianceUncertainty,
} from './mixed-diagnostics';
import { type Components, type NoiseLayout, solveNoise } from './mixed-noise';
import { type RemlEstimate, type Scatter, type ScatterRule, type Termination } from './reml';

/** The observations of one group. */
export interface GroupRows {
  /** y, shape (n) [unit]. */
  readonly response: Float64Array;
  /** X, column-major, shape (n, p). */
  readonly design: Float64Array;
  /** σ_i ≥ 0, shape (n) [unit]. Zero is allowed where there is something else: a scatter or a subject's error. */
  readonly sigma: Float64Array;
  /** Subject of each row, an index into `subjectSigma`: shape (n). */
  readonly subject: Int32Array;
  /** Block of each row, 0 … blocks − 1, shape (n); null where rows share no block effect (one row a block). */
  readonly block: Int32Array | null;
  readonly observationScatter: ScatterRule;
  /** Not used without blocks. */
  readonly blockScatter: ScatterRule;
  /** On columns of `design`. */
  readonly priors: readonly Prior[];
  /** Where the search for the components begins, from a fit of nearly the same rows; it only saves time [unit²]. */
  readonly near?: Components;
}

/** What is known of a group's observations after a fit. All arrays have shape (n). */
export interface RowDiagnostics {
  /** y − Xβ [unit]. */
  readonly marginalResiduals: Float64Array;
  /** y − Xβ − Sa − Fb [unit]. */
  readonly conditionalResiduals: Float64Array;
  /** What a row differs by from its prediction by all the other rows, its block's and subject's included, in units of
   * that difference's standard deviation [1]; 0 where the others predict nothing. */
  readonly deletionResiduals: Float64Array;
  /** How much the fitted Xβ of a row moves with its own response [1]; with the priors' leverage the sum is p. */
  readonly leverage: Float64Array;
}

export interface GroupFit extends RowDiagnostics {
  /** β, shape (p). */
  readonly coefficients: Float64Array;
  /** Covariance of β and, in a joint model, the shared γ after it, row-major, shape (p + q, p + q). */
  readonly covariance: Float64Array;
  /** Degrees of freedom for the t intervals of β and γ, at least 1, shape (p + q); Infinity where no component is
   * estimated, or all that are came out zero. Only this group's components count as uncertain. */
  readonly degreesOfFreedom: Float64Array;
  readonly observationScatter: Scatter;
  readonly blockScatter: Scatter;
  /** For `near` of a fit of nearly the same rows [unit²]. */
  readonly near: Components;
  /** Best linear predictions of b [unit], shape (blocks). */
  readonly blockEffects: Float64Array;
  /** Share of each prior in its coefficient [1], in the order of the priors. */
  readonly priorLeverage: Float64Array;
  /** Of the whitened own design with columns of equal length. */
  readonly conditionNumber: number;
  /** Of the search for the components. */
  readonly termination: Termination;
}

/** What `describeGroup` finds besides, for sums over groups. */
export interface GroupSums {
  /** V⁻¹(y − Xβ − Qγ), shape (n) [1 per unit]. */
  readonly v: Float64Array;
  /** Variance of the variances of β and γ through this group's components, shape (p + q). */
  readonly uncertainty: Float64Array;
}

/** All that a solution says of one group.
 * @param elimination - the solution
 * @param k - which group
 * @param rows - what was given of it
 * @param reml - its components
 * @returns the group's part of the result, and what sums over groups need
 * @accuracy as the elimination
 * @source Henderson 1975, Biometrics 31, 423 (predictions); see `mixed-diagnostics` */
export function describeGroup(
  elimination: Elimination,
  k: number,
  rows: GroupRows,
  reml: RemlEstimate,
): { readonly fit: GroupFit; readonly sums: GroupSums } {
  const group = elimination.input.groups[k]!;
  const { noise } = group;
  const sense = senseGroup(elimination, k);
  const coefficients = elimination.coefficients[k]!;
  const n = noise.layout.rows;
  const p = coefficients.length;
  const q = elimination.input.sharedColumns;
  const { rest, remaining } = residualsOf(elimination, k);
  const v = solveNoise(noise, remaining);
  const leverage = new Float64Array(n);
  addLeverage(rows.design, sense.gradient.subarray(0, n * p), leverage);
  addLeverage(group.shared, sense.gradient.subarray(n * p), leverage);
  const uncertainty = varianceUncertainty(noise, sense.gradient, reml.componentCovariance);
  const varianceOf = (j: number): number => sense.covariance[j * (p + q + 1)]!;
  return {
    fit: {
      coefficients,
      covariance: sense.covariance,
      degreesOfFreedom: uncertainty.map((value, j) => degreesOfFreedom(varianceOf(j), value)),
      observationScatter: reml.observation,
      blockScatter: reml.block,
      near: reml.near,
      blockEffects: predictBlocks(noise, v),
      marginalResiduals: rest,
      conditionalResiduals: conditionalResiduals(rows.sigma, noise, v),
      deletionResiduals: deletionResiduals(sense.alone.inverseDiagonal, sense.diagonal, v),
      leverage,
      priorLeverage: Float64Array.from(rows.priors, ({ column, sigma }) => varianceOf(column) / sigma ** 2),
      conditionNumber: conditionNumber(elimination.groups[k]!.qr),
      termination: reml.termination,
    },
    sums: { v, uncertainty },
  };
}

/** y − Xβ − Qγ, and what the border's predicted effects leave of it: A⁻¹ of this is V⁻¹ of that. */
function residualsOf(
  { input, coefficients, shared, borderEffects }: Elimination,
  k: number,
): { readonly rest: Float64Array; readonly remaining: Float64Array } {
  const { own, shared: sharedDesign, border } = input.groups[k]!;
  const rest = withoutColumns(
    withoutColumns(own.response, own.design, coefficients[k]!),
    sharedDesign,
    shared,
  );
  const remaining = rest.map((value, i) => (border[i]! >= 0 ? value - borderEffects[border[i]!]! : value));
  return { rest, remaining };
}

/** V⁻¹(y − Xβ − Qγ) of one group's rows.
 * @param elimination - the solution
 * @param k - which group
 * @returns shape (n) [1 per unit]
 * @accuracy as the elimination
 * @source Henderson 1975, Biometrics 31, 423 */
export function solvedResiduals(elimination: Elimination, k: number): Float64Array {
  return solveNoise(elimination.input.groups[k]!.noise, residualsOf(elimination, k).remaining);
}

/** y − X β. */
function withoutColumns(y: Float64Array, design: Float64Array, coefficients: Float64Array): Float64Array {
  const rest = Float64Array.from(y);
  for (const [j, value] of coefficients.entries()) {
    for (let i = 0; i < rest.length; i += 1) rest[i]! -= value * design[j * rest.length + i]!;
  }
  return rest;
}

/** A row without any error, where the scatter that would be its only one has no row to be estimated from.
 * @param layout - of the group
 * @param part - its design
 * @param rule - for the observations' scatter
 * @returns whether that is so
 * @accuracy exact
 * @source definition */
export function hasNoScale(layout: NoiseLayout, part: LinearPart, rule: ScatterRule): boolean {
  if (layout.knownVariance.every((variance) => variance > 0)) return false;
  return rule.kind === 'hold' ? rule.sigma === 0 : part.response.length + part.priors.length <= part.columns;
}

/** Refuses what no solver could make sense of.
 * @param group - what is given
 * @param columns - p [1]
 * @param subjectSigma - τ of each subject [unit]
 * @throws {RangeError} when shapes do not agree, an index is out of range, a number is not finite or an error is negative
 * @source definition */
export function requireGroup(group: GroupRows, columns: number, subjectSigma: Float64Array): void {
  const { response, design, sigma, subject, block, priors } = group;
  const rows = response.length;
  const refuse = (what: string): never => {
    throw new RangeError(what);
  };
  if (design.length !== rows * columns)
    refuse(`The design has ${design.length} numbers, not ${rows} × ${columns}.`);
  if (sigma.length !== rows || subject.length !== rows || (block !== null && block.length !== rows)) {
    refuse(`Errors, subjects and blocks must have ${rows} numbers, as the response has.`);
  }
  if (!response.every(Number.isFinite) || !design.every(Number.isFinite)) refuse('A number is not finite.');
  const isError = (value: number): boolean => value >= 0 && Number.isFinite(value);
  if (!sigma.every(isError) || !subjectSigma.every(isError)) refuse('An error is negative or not finite.');
  if (!subject.every((s) => s >= 0 && s < subjectSigma.length))
    refuse('A row names a subject without an error.');
  if (block !== null && !block.every((b) => b >= 0)) refuse('A block has a negative number.');
  requirePriors(priors, columns);
  for (const rule of [group.observationScatter, group.blockScatter]) {
    if (rule.kind === 'hold' && !isError(rule.sigma)) refuse('A held scatter is negative or not finite.');
  }
}

/** Refuses priors on columns that do not exist, or without a value and an error.
 * @param priors - what is given
 * @param columns - of the design [1]
 * @throws {RangeError} for the first of them
 * @source definition */
export function requirePriors(priors: readonly Prior[], columns: number): void {
  for (const { column, value, sigma } of priors) {
    if (!(Number.isInteger(column) && column >= 0 && column < columns)) {
      throw new RangeError(`No column ${column} for a prior.`);
    }
    if (!(Number.isFinite(value) && sigma > 0 && Number.isFinite(sigma))) {
      throw new RangeError('A prior needs a value and an error > 0.');
    }
  }
}
