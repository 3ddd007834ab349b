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
import { eliminate } from './block-elimination';
import { type LinearPart } from './generalised-least-squares';
import { inseparableColumns } from './householder-qr';
import { factorColumns } from './joint-columns';
import { addSubjectSums } from './mixed-diagnostics';
import { describeGroup, type GroupFit, type GroupRows, hasNoScale, requireGroup } from './mixed-group';
import { factorNoise, layoutNoise } from './mixed-noise';
import { estimateComponents } from './reml';

export interface MixedModelInput extends GroupRows {
  /** p */
  readonly columns: number;
  /** τ_s ≥ 0 of each subject [unit]; zero takes the subject's effect out of the model. */
  readonly subjectSigma: Float64Array;
}

export interface MixedModelFit extends GroupFit {
  readonly kind: 'determined';
  /** Best linear predictions of a [unit], shape (subjects); 0 for subjects without rows. */
  readonly subjectEffects: Float64Array;
  /** r′V⁻¹r, priors included; its expectation is n + priors − p. */
  readonly chi2: number;
  /** That and log |V| + log |X′V⁻¹X|, priors included: what REML minimises. */
  readonly criterion: number;
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
  requireGroup(input, input.columns, input.subjectSigma);
  const part: LinearPart = input;
  // Whether columns are independent depends on no error, so it is asked before any is estimated.
  const dependent = inseparableColumns(
    factorColumns(input.design, input.response.length, input.columns, input.priors),
  );
  if (dependent.length > 0) return { kind: 'undetermined', reason: 'inseparable', dependent };
  const layout = layoutNoise({ ...input, elsewhere: null });
  if (hasNoScale(layout, part, input.observationScatter))
    return { kind: 'undetermined', reason: 'no-scale', dependent: [] };
  const reml = estimateComponents(
    layout,
    part,
    [input.observationScatter, input.blockScatter],
    input.near ?? null,
  );
  const noise = factorNoise(layout, reml.components);
  const none = new Int32Array(layout.rows).fill(-1);
  // A joint model of one group, in which nothing is shared.
  const elimination = eliminate({
    groups: [{ noise, own: part, shared: new Float64Array(0), border: none }],
    sharedColumns: 0,
    sharedPriors: [],
    borderTau: new Float64Array(0),
  });
  const { fit, sums } = describeGroup(elimination, 0, input, reml);
  const bySubject = new Float64Array(input.subjectSigma.length);
  addSubjectSums(bySubject, input.subject, sums.v);
  return {
    kind: 'determined',
    ...fit,
    subjectEffects: bySubject.map((sum, s) => input.subjectSigma[s]! ** 2 * sum),
    chi2: elimination.chi2,
    criterion: elimination.logDet + elimination.chi2,
  };
}
