/**
 * Linear mixed model of one group of observations:
 *
 *     y = X β + S a + F b + e      var(e_i) = σ_i² + σ_o²,  var(a_s) = τ_s²,  var(b_f) = σ_b²
 *
 * | symbol | code name | shape | unit | meaning |
 * |---|---|---|---|---|
 * | y | response | (n) | unit | observations |
 * | X, β | design, coefficients | (n, p), (p) | | what is sought; a coefficient may have a prior, value ± sigma |
 * | S, a, τ | subject, subjectEffects, subjectSigma | | unit | an error that all observations of a subject share, of known size |
 * | F, b, σ_b | block, blockEffects, block scatter | | unit | an error that all observations of a block share, of unknown size |
 * | σ_i | sigma | (n) | unit | known error of each observation |
 * | σ_o | observation scatter | | unit | unknown error that every observation has besides |
 *
 * σ_o and σ_b come from restricted maximum likelihood (`reml`); β from a QR of the whitened design, columns scaled. All
 * errors are normal and independent of each other.
 */
import { fitWhitened, type LinearPart, type Prior } from './generalised-least-squares';
import { conditionNumber, factorQr, inseparableColumns, inverseR } from './householder-qr';
import {
  addSubjectSums,
  conditionalResiduals,
  deletionResiduals,
  predictBlocks,
  type RowDiagnostics,
  rowLeverage,
  satterthwaite,
} from './mixed-diagnostics';
import { factorNoise, layoutNoise, type NoiseLayout, solveNoise, whiten } from './mixed-noise';
import { projectNoise } from './noise-traces';
import { estimateComponents, residuals, type Scatter, type ScatterRule, type Termination } from './reml';

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
}

export interface MixedModelInput extends GroupRows {
  /** p */
  readonly columns: number;
  /** τ_s ≥ 0 of each subject [unit]; zero takes the subject's effect out of the model. */
  readonly subjectSigma: Float64Array;
}

export interface MixedModelFit extends RowDiagnostics {
  readonly kind: 'determined';
  /** β, shape (p). */
  readonly coefficients: Float64Array;
  /** (X′V⁻¹X)⁻¹, row-major, shape (p, p). */
  readonly covariance: Float64Array;
  /** Degrees of freedom of each coefficient's t interval, at least 1, shape (p); Infinity where all components are held or zero. */
  readonly degreesOfFreedom: Float64Array;
  readonly observationScatter: Scatter;
  readonly blockScatter: Scatter;
  /** Best linear predictions [unit]: shape (subjects), 0 for subjects without rows; shape (blocks). */
  readonly subjectEffects: Float64Array;
  readonly blockEffects: Float64Array;
  /** Share of each prior in its coefficient [1], in the order of the priors. */
  readonly priorLeverage: Float64Array;
  /** r′V⁻¹r, priors included; its expectation is n + priors − p. */
  readonly chi2: number;
  /** log |V| of the observations; log |X′V⁻¹X|, priors included. */
  readonly logDetCovariance: number;
  readonly logDetInformation: number;
  /** The sum of the three above: what REML minimises. */
  readonly criterion: number;
  /** Of the whitened design with columns of equal length. */
  readonly conditionNumber: number;
  readonly termination: Termination;
}

export interface UndeterminedModel {
  readonly kind: 'undetermined';
  /** 'inseparable': the data cannot tell the columns of each set apart. 'no-scale': rows without an error of their own,
   * and no row to spare from which to estimate one. */
  readonly reason: 'inseparable' | 'no-scale';
  /** Sets of columns; empty for 'no-scale'. */
  readonly dependent: readonly (readonly number[])[];
}

/** Fits the mixed model.
 * @param input - rows, design, errors, rules for the components, priors
 * @returns coefficients and all that belongs to them, or the columns that cannot be told apart
 * @throws {RangeError} when shapes do not agree, an index is out of range, a number is not finite or an error is negative
 * @accuracy coefficients and covariance 1e-9 relative at given components; components 1e-6 relative against a dense
 * minimisation of the same criterion
 * @source Patterson and Thompson 1971, Biometrika 58, 545 (components); Henderson 1975, Biometrics 31, 423 (predictions);
 * Satterthwaite 1946, Biometrics Bulletin 2, 110 (degrees of freedom) */
export function fitMixedModel(input: MixedModelInput): MixedModelFit | UndeterminedModel {
  requireShapes(input);
  const part: LinearPart = input;
  const dependent = inseparableSets(part);
  if (dependent.length > 0) return { kind: 'undetermined', reason: 'inseparable', dependent };
  const layout = layoutNoise({ ...input, elsewhere: null });
  if (hasNoScale(layout, input)) return { kind: 'undetermined', reason: 'no-scale', dependent: [] };
  const reml = estimateComponents(layout, part, [input.observationScatter, input.blockScatter]);
  const noise = factorNoise(layout, reml.components);
  const fit = fitWhitened(noise, part);
  const inverse = inverseR(fit.qr);
  const covariance = outerProduct(inverse, input.columns);
  const projection = projectNoise(noise, input.design, inverse, input.columns);
  const rest = residuals(part, fit.coefficients);
  const v = solveNoise(noise, rest);
  const sums = new Float64Array(input.subjectSigma.length);
  addSubjectSums(sums, input.subject, v);
  return {
    kind: 'determined',
    coefficients: fit.coefficients,
    covariance,
    degreesOfFreedom: satterthwaite(projection, inverse, reml.componentCovariance),
    observationScatter: reml.observation,
    blockScatter: reml.block,
    subjectEffects: sums.map((sum, s) => input.subjectSigma[s]! ** 2 * sum),
    blockEffects: predictBlocks(noise, v),
    marginalResiduals: rest,
    conditionalResiduals: conditionalResiduals(input.sigma, noise, v),
    whitenedResiduals: whiten(noise, rest),
    deletionResiduals: deletionResiduals(projection.inverseDiagonal, projection.diagonal, v),
    leverage: rowLeverage(input.design, inverse, projection),
    priorLeverage: Float64Array.from(
      input.priors,
      ({ column, sigma }) => covariance[column * input.columns + column]! / sigma ** 2,
    ),
    chi2: fit.chi2,
    logDetCovariance: noise.logDet,
    logDetInformation: fit.logDetInformation,
    criterion: reml.criterion,
    conditionNumber: conditionNumber(fit.qr),
    termination: reml.termination,
  };
}

/** U U′. */
function outerProduct(inverse: Float64Array, columns: number): Float64Array {
  const product = new Float64Array(columns * columns);
  for (let i = 0; i < columns; i += 1) {
    for (let j = 0; j < columns; j += 1) {
      let sum = 0;
      for (let k = 0; k < columns; k += 1) sum += inverse[k * columns + i]! * inverse[k * columns + j]!;
      product[i * columns + j] = sum;
    }
  }
  return product;
}

/** Whether columns are independent depends on no error, so it is asked before any is estimated. */
function inseparableSets({ design, columns, priors, response }: LinearPart): readonly (readonly number[])[] {
  const rows = response.length;
  const all = rows + priors.length;
  const stacked = new Float64Array(all * columns);
  for (let j = 0; j < columns; j += 1) stacked.set(design.subarray(j * rows, (j + 1) * rows), j * all);
  for (const [k, { column }] of priors.entries()) stacked[column * all + rows + k] = 1;
  return inseparableColumns(factorQr(stacked, all, columns));
}

/** A row without any error, where the scatter that would be its only one has no row to be estimated from. */
function hasNoScale(layout: NoiseLayout, input: MixedModelInput): boolean {
  const { observationScatter: rule, response, priors, columns } = input;
  const given = rule.kind === 'hold' && rule.sigma > 0;
  const bare = layout.knownVariance.some((variance) => variance === 0);
  return bare && !given && (rule.kind === 'hold' || response.length + priors.length <= columns);
}

function requireShapes(input: MixedModelInput): void {
  const { response, design, columns, sigma, subject, subjectSigma, block, priors } = input;
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
  for (const { column, value, sigma: width } of priors) {
    if (!(Number.isInteger(column) && column >= 0 && column < columns))
      refuse(`No column ${column} for a prior.`);
    if (!(Number.isFinite(value) && width > 0 && Number.isFinite(width)))
      refuse('A prior needs a value and an error > 0.');
  }
  for (const rule of [input.observationScatter, input.blockScatter]) {
    if (rule.kind === 'hold' && !isError(rule.sigma)) refuse('A held scatter is negative or not finite.');
  }
}
