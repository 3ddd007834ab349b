/**
 * The mixed model of `mixed-model` for many groups at once: each group has coefficients and components of its own, and
 * some coefficients, and the errors of subjects, are the same in all groups:
 *
 *     y_k = X_k β_k + Q_k γ + S_k a + F_k b_k + e_k
 *
 * | symbol | code name | shape | meaning |
 * |---|---|---|---|
 * | X, β | design, coefficients | (n, p), (p) | a group's own columns and coefficients |
 * | Q, γ | sharedDesign, shared | (n, q), (q) | columns whose coefficients all groups share |
 * | a | subjectEffects | (subjects) | one error a subject, in all groups the same |
 *
 * The components σ_o and σ_b of a group come from its own restricted likelihood, with those of its columns, own and
 * shared, that it can tell apart; a refinement then moves them by a step of the joint likelihood. Cost is linear in the
 * number of groups (`block-elimination`).
 */
import { eliminate, type Elimination, type EliminationGroup } from './block-elimination';
import { type Prior } from './generalised-least-squares';
import { senseGroup } from './group-sensitivity';
import { inverseR } from './householder-qr';
import { factorColumns, inseparableJointColumns, type JointColumn } from './joint-columns';
import { addSubjectSums, degreesOfFreedom } from './mixed-diagnostics';
import {
  describeGroup,
  type GroupFit,
  type GroupRows,
  hasNoScale,
  requireGroup,
  requirePriors,
  solvedResiduals,
} from './mixed-group';
import { factorNoise, layoutNoise, type NoiseLayout } from './mixed-noise';
import { estimateComponents, refineComponents, type RemlEstimate } from './reml';

export interface JointGroup extends GroupRows {
  /** p of this group. */
  readonly columns: number;
  /** Q, column-major, shape (n, q). */
  readonly sharedDesign: Float64Array;
}

export interface JointMixedModelInput {
  readonly groups: readonly JointGroup[];
  /** q */
  readonly sharedColumns: number;
  /** On columns of the shared design. */
  readonly sharedPriors: readonly Prior[];
  /** τ_s ≥ 0 of each subject [unit]; `subject` of every group refers to it. */
  readonly subjectSigma: Float64Array;
  /** Steps of the joint likelihood after each group's own, 0 or more. One is enough when many groups share little. */
  readonly refinements: number;
}

export interface JointMixedModelFit {
  readonly kind: 'determined';
  /** γ, shape (q). */
  readonly shared: Float64Array;
  /** Covariance of γ, row-major, shape (q, q). */
  readonly sharedCovariance: Float64Array;
  /** For the t intervals of γ, at least 1, shape (q); the components of all groups count as uncertain. */
  readonly sharedDegreesOfFreedom: Float64Array;
  readonly groups: readonly GroupFit[];
  /** Best linear predictions of a [unit], shape (subjects); 0 for subjects without rows. */
  readonly subjectEffects: Float64Array;
  /** r′V⁻¹r, priors included. */
  readonly chi2: number;
  /** log |V| + log |X′V⁻¹X| + χ² over all groups and columns. */
  readonly criterion: number;
}

export interface UndeterminedJointModel {
  readonly kind: 'undetermined';
  /** As for `mixed-model`. */
  readonly reason: 'inseparable' | 'no-scale';
  /** Sets of columns that the data cannot tell apart; empty for 'no-scale'. */
  readonly dependent: readonly (readonly JointColumn[])[];
  /** Groups without a scale; empty for 'inseparable'. */
  readonly groups: readonly number[];
}

/** Fits all groups together.
 * @param input - groups, shared columns and priors, subjects' errors
 * @returns coefficients, own and shared, and all that belongs to them, or the columns that cannot be told apart
 * @throws {RangeError} when shapes do not agree, an index is out of range, a number is not finite or an error is negative
 * @accuracy 1e-9 relative against one dense solution at the same components
 * @source Patterson and Thompson 1971, Biometrika 58, 545; Henderson 1975, Biometrics 31, 423; Björck 1996, Numerical
 * Methods for Least Squares Problems, section 6.3 */
export function fitJointMixedModel(input: JointMixedModelInput): JointMixedModelFit | UndeterminedJointModel {
  requireJoint(input);
  const { groups, sharedColumns, sharedPriors } = input;
  const dependent = inseparableJointColumns(
    groups.map((group) => ({ ...group, rows: group.response.length })),
    sharedColumns,
    sharedPriors,
  );
  if (dependent.length > 0) return { kind: 'undetermined', reason: 'inseparable', dependent, groups: [] };
  const estimates = groups.map((group) => estimateAlone(group, input));
  const lost = [...estimates.keys()].filter((k) => estimates[k] === null);
  if (lost.length > 0) return { kind: 'undetermined', reason: 'no-scale', dependent: [], groups: lost };

  const border = findBorder(input);
  const layouts = groups.map((group) =>
    layoutNoise({ ...group, ...border, subjectSigma: input.subjectSigma }),
  );
  let components = estimates.filter((estimate) => estimate !== null);
  let elimination = solve(input, { border, layouts, components });
  for (let step = 0; step < input.refinements; step += 1) {
    // One step of the joint likelihood in the components of each group.
    components = components.map((estimate, k) =>
      refineComponents(estimate, senseGroup(elimination, k), solvedResiduals(elimination, k)),
    );
    elimination = solve(input, { border, layouts, components });
  }
  return collect(input, elimination, components);
}

/** The group's own restricted likelihood, with the columns that it can tell apart; null when it has no scale. */
function estimateAlone(group: JointGroup, input: JointMixedModelInput): RemlEstimate | null {
  const rows = group.response.length;
  const design = new Float64Array(group.design.length + group.sharedDesign.length);
  design.set(group.design);
  design.set(group.sharedDesign, group.design.length);
  const width = group.columns + input.sharedColumns;
  const priors = [
    ...group.priors,
    ...input.sharedPriors.map((prior) => ({ ...prior, column: group.columns + prior.column })),
  ];
  // The likelihood depends on the space of the columns alone, so that any that span it will do. A column with a prior is
  // never among those left out.
  const qr = factorColumns(design, rows, width, priors);
  const kept = [...qr.order.subarray(0, qr.rank)].sort((a, b) => a - b);
  const reduced = new Float64Array(rows * kept.length);
  for (const [j, column] of kept.entries()) {
    reduced.set(design.subarray(column * rows, (column + 1) * rows), j * rows);
  }
  const part = {
    design: reduced,
    columns: kept.length,
    response: group.response,
    priors: priors.map((prior) => ({ ...prior, column: kept.indexOf(prior.column) })),
  };
  const layout = layoutNoise({ ...group, subjectSigma: input.subjectSigma, elsewhere: null });
  if (hasNoScale(layout, part, group.observationScatter)) return null;
  return estimateComponents(layout, part, [group.observationScatter, group.blockScatter], group.near ?? null);
}

interface Border {
  /** 1 for subjects that several groups saw, shape (subjects). */
  readonly elsewhere: Uint8Array;
  /** Their place in the border, −1 for the others, shape (subjects). */
  readonly placeOf: Int32Array;
  readonly tau: Float64Array;
}

function findBorder({ groups, subjectSigma }: JointMixedModelInput): Border {
  const firstSeen = new Int32Array(subjectSigma.length).fill(-1);
  const elsewhere = new Uint8Array(subjectSigma.length);
  for (const [k, { subject }] of groups.entries()) {
    for (const s of subject) {
      if (firstSeen[s] === -1) firstSeen[s] = k;
      else if (firstSeen[s] !== k && subjectSigma[s]! > 0) elsewhere[s] = 1;
    }
  }
  const placeOf = new Int32Array(subjectSigma.length).fill(-1);
  const places: number[] = [];
  for (const [s, isShared] of elsewhere.entries()) if (isShared === 1) placeOf[s] = places.push(s) - 1;
  return { elsewhere, placeOf, tau: Float64Array.from(places, (s) => subjectSigma[s]!) };
}

interface Given {
  readonly border: Border;
  readonly layouts: readonly NoiseLayout[];
  readonly components: readonly RemlEstimate[];
}

function solve(input: JointMixedModelInput, { border, layouts, components }: Given): Elimination {
  const groups = input.groups.map((group, k): EliminationGroup => ({
    noise: factorNoise(layouts[k]!, components[k]!.components),
    own: group,
    shared: group.sharedDesign,
    border: group.subject.map((s) => border.placeOf[s]!),
  }));
  return eliminate({
    groups,
    sharedColumns: input.sharedColumns,
    sharedPriors: input.sharedPriors,
    borderTau: border.tau,
  });
}

function collect(
  input: JointMixedModelInput,
  elimination: Elimination,
  components: readonly RemlEstimate[],
): JointMixedModelFit {
  const { groups, sharedColumns: q, subjectSigma } = input;
  const bySubject = new Float64Array(subjectSigma.length);
  const uncertainty = new Float64Array(q);
  const fits = groups.map((group, k) => {
    const { fit, sums } = describeGroup(elimination, k, group, components[k]!);
    addSubjectSums(bySubject, group.subject, sums.v);
    for (let m = 0; m < q; m += 1) uncertainty[m]! += sums.uncertainty[group.columns + m]!;
    return fit;
  });
  const root = inverseR(elimination.qr);
  const sharedCovariance = Float64Array.from({ length: q * q }, (_, at) => {
    let sum = 0;
    for (let c = 0; c < q; c += 1) sum += root[c * q + Math.floor(at / q)]! * root[c * q + (at % q)]!;
    return sum;
  });
  return {
    kind: 'determined',
    shared: elimination.shared,
    sharedCovariance,
    sharedDegreesOfFreedom: uncertainty.map((value, m) =>
      degreesOfFreedom(sharedCovariance[m * (q + 1)]!, value),
    ),
    groups: fits,
    subjectEffects: bySubject.map((sum, s) => subjectSigma[s]! ** 2 * sum),
    chi2: elimination.chi2,
    criterion: elimination.logDet + elimination.chi2,
  };
}

function requireJoint({
  groups,
  sharedColumns,
  sharedPriors,
  subjectSigma,
  refinements,
}: JointMixedModelInput): void {
  for (const group of groups) {
    requireGroup(group, group.columns, subjectSigma);
    if (group.sharedDesign.length !== group.response.length * sharedColumns) {
      throw new RangeError(
        `A shared design does not have ${group.response.length} × ${sharedColumns} numbers.`,
      );
    }
    if (!group.sharedDesign.every(Number.isFinite)) throw new RangeError('A number is not finite.');
  }
  requirePriors(sharedPriors, sharedColumns);
  if (!Number.isInteger(refinements) || refinements < 0) {
    throw new RangeError(`Refinements are a number of steps, not ${refinements}.`);
  }
}
