/**
 * The mixed model of one band (lib/numerics) asked with the rows of a problem, and its answer night by night.
 */
import { type Prior } from '@/lib/numerics/generalised-least-squares';
import { fitJointMixedModel } from '@/lib/numerics/joint-mixed-model';
import { type JointColumn } from '@/lib/numerics/joint-columns';
import { type GroupFit, type GroupRows } from '@/lib/numerics/mixed-group';
import { fitMixedModel } from '@/lib/numerics/mixed-model';
import { type Components } from '@/lib/numerics/mixed-noise';
import { type ScatterRule, type Termination } from '@/lib/numerics/reml';
import { designOf, nightCoefficients, type BandProblem } from './band-problem';
import { type CoefficientName } from './fit-model';
import { blocksOf, pick } from './night-view';

/** One night of a band. Order of coefficients: that of the problem's sought ones. */
export interface NightFit {
  readonly night: number;
  /** Rows of the problem that were fitted, shape (n). */
  readonly rows: Int32Array;
  readonly coefficients: Float64Array;
  /** Row-major, shape (p, p). */
  readonly covariance: Float64Array;
  /** Of each coefficient's t interval, shape (p). */
  readonly degreesOfFreedom: Float64Array;
  readonly components: Components;
  /** Where the search for those of nearly the same rows may begin. */
  readonly near: Components;
  /** Whether some frame has two rows, so that its scatter can be told from that of observations. */
  readonly hasFrameScatter: boolean;
  readonly chi2: number;
  readonly conditionNumber: number;
  /** What is known of this night's coefficients beside its own rows: the model's priors, and in a joint fit the shared
   * coefficients with their errors. To those the night has contributed itself: with few nights a little too sure. */
  readonly priors: readonly Prior[];
  readonly converged: boolean;
}

export type BandFit =
  | { readonly kind: 'determined'; readonly nights: readonly NightFit[] }
  | {
      readonly kind: 'undetermined';
      readonly reason: 'inseparable' | 'no-scale';
      readonly dependent: readonly (readonly CoefficientName[])[];
    };

/** Priors of the model, on the columns of the problem.
 * @param problem - of the band
 * @returns priors
 * @source definition */
export function modelPriors(problem: BandProblem): readonly Prior[] {
  return problem.sought.flatMap(({ term }, column) =>
    term.status === 'prior' ? [{ column, value: term.value, sigma: term.error }] : [],
  );
}

/** Rows of each night among some rows.
 * @param problem - of the band
 * @param rows - numbers of rows, shape (m) [1]
 * @returns nights that have rows, ascending, with their rows
 * @source definition */
export function rowsByNight(
  problem: BandProblem,
  rows: Int32Array,
): readonly { readonly night: number; readonly rows: Int32Array }[] {
  const byNight = new Map<number, number[]>();
  for (const row of rows) {
    const night = problem.night[row]!;
    const known = byNight.get(night);
    if (known === undefined) byNight.set(night, [row]);
    else known.push(row);
  }
  return [...byNight]
    .map(([night, own]) => ({ night, rows: Int32Array.from(own) }))
    .sort((a, b) => a.night - b.night);
}

/** Whether some frame has two of the rows.
 * @param problem - of the band
 * @param rows - numbers of rows, shape (m) [1]
 * @returns true when one has
 * @source definition */
export function sharesFrames(problem: BandProblem, rows: Int32Array): boolean {
  return new Set(Array.from(rows, (row) => problem.frame[row]!)).size < rows.length;
}

/** Fits a band by restricted maximum likelihood: one night by itself, several jointly.
 * @param problem - of the band
 * @param rows - numbers of rows that take part, shape (m) [1]
 * @param before - a fit of nearly the same rows, which saves time; null for none
 * @returns the fit of every night that has rows, or what cannot be told apart
 * @accuracy as lib/numerics/mixed-model and joint-mixed-model
 * @source see there */
export function fitBand(problem: BandProblem, rows: Int32Array, before: BandFit | null): BandFit {
  const known = before?.kind === 'determined' ? before.nights : [];
  if (problem.nights > 1) return fitJointly(problem, rows, known);
  return fitAlone(problem, rows, { priors: modelPriors(problem), near: known[0]?.near ?? null });
}

const usual: ScatterRule = { kind: 'estimate' };

function groupOf(
  problem: BandProblem,
  rows: Int32Array,
  near: Components | null,
): Omit<GroupRows, 'design' | 'priors'> {
  return {
    response: pick(problem.response, rows),
    sigma: pick(problem.sigma, rows),
    subject: rows.map((row) => problem.star[row]!),
    block: sharesFrames(problem, rows) ? blocksOf(problem, rows) : null,
    observationScatter: usual,
    blockScatter: usual,
    ...(near === null ? {} : { near }),
  };
}

const hasEnded = ({ reason }: Termination): boolean =>
  reason === 'converged' || reason === 'fixed' || reason === 'no-freedom';

export interface AloneOptions {
  /** On the columns of the problem. */
  readonly priors: readonly Prior[];
  /** Where the search for the components begins, from a fit of nearly the same rows; null for none [mag²]. */
  readonly near: Components | null;
}

/** Fits rows of one night.
 * @param problem - of the band
 * @param rows - of the night, shape (n) [1]
 * @param options - priors, and where to begin
 * @returns the fit, or what cannot be told apart
 * @accuracy as lib/numerics/mixed-model
 * @source see there */
export function fitAlone(problem: BandProblem, rows: Int32Array, options: AloneOptions): BandFit {
  const { priors, near } = options;
  const group = groupOf(problem, rows, near);
  const fit = fitMixedModel({
    ...group,
    design: designOf(problem, rows),
    columns: problem.sought.length,
    subjectSigma: knownErrors(problem),
    priors,
  });
  if (fit.kind === 'undetermined') {
    return { ...fit, dependent: fit.dependent.map((set) => namesOf(problem, set)) };
  }
  return {
    kind: 'determined',
    nights: [
      {
        night: problem.night[rows[0]!]!,
        rows,
        coefficients: fit.coefficients,
        covariance: fit.covariance,
        degreesOfFreedom: fit.degreesOfFreedom,
        components: componentsOf(fit),
        near: fit.near,
        hasFrameScatter: group.block !== null,
        chi2: fit.chi2,
        conditionNumber: fit.conditionNumber,
        priors,
        converged: hasEnded(fit.termination),
      },
    ],
  };
}

const knownErrors = ({ starSigma }: BandProblem): Float64Array =>
  starSigma.map((sigma) => (Number.isFinite(sigma) ? sigma : 0));

const componentsOf = ({ observationScatter, blockScatter }: GroupFit): Components => ({
  observation: observationScatter.sigma ** 2,
  block: blockScatter.sigma ** 2,
});

const namesOf = ({ sought }: BandProblem, columns: readonly number[]): readonly CoefficientName[] =>
  columns.map((column) => sought[column]!.name);

/** Some columns of a design of n rows. */
function columnsOf(design: Float64Array, n: number, columns: readonly number[]): Float64Array {
  const part = new Float64Array(columns.length * n);
  for (const [k, column] of columns.entries()) part.set(design.subarray(column * n, (column + 1) * n), k * n);
  return part;
}

/** Zero point, extinction and their drifts are each night's own; the other columns are shared. */
function fitJointly(problem: BandProblem, rows: Int32Array, before: readonly NightFit[]): BandFit {
  const nearOf = new Map(before.map(({ night, near }) => [night, near] as const));
  const nights = rowsByNight(problem, rows);
  const places = problem.sought.map((_, column) => column);
  const own = places.filter((column) => nightCoefficients.includes(problem.sought[column]!.name));
  const shared = places.filter((column) => !own.includes(column));
  const priors = modelPriors(problem);
  const priorsOn = (columns: readonly number[]): Prior[] =>
    priors.flatMap((prior) => {
      const column = columns.indexOf(prior.column);
      return column < 0 ? [] : [{ ...prior, column }];
    });
  const groups = nights.map((night) => {
    const design = designOf(problem, night.rows);
    return {
      ...groupOf(problem, night.rows, nearOf.get(night.night) ?? null),
      design: columnsOf(design, night.rows.length, own),
      columns: own.length,
      sharedDesign: columnsOf(design, night.rows.length, shared),
      priors: priorsOn(own),
    };
  });
  const fit = fitJointMixedModel({
    groups,
    sharedColumns: shared.length,
    sharedPriors: priorsOn(shared),
    subjectSigma: knownErrors(problem),
    refinements: 1,
  });
  if (fit.kind === 'undetermined') {
    const columnOf = ({ group, column }: JointColumn): number =>
      group === null ? shared[column]! : own[column]!;
    return {
      ...fit,
      dependent: fit.dependent.map((set) => namesOf(problem, [...new Set(set.map(columnOf))].sort())),
    };
  }
  // In a group's results its own columns come first, then the shared ones.
  const order = [...own, ...shared];
  const p = order.length;
  const sharedPriors = shared.map((column, k) => ({
    column,
    value: fit.shared[k]!,
    sigma: Math.sqrt(fit.sharedCovariance[k * (shared.length + 1)]!),
  }));
  return {
    kind: 'determined',
    nights: nights.map(({ night, rows: nightRows }, k): NightFit => {
      const group = fit.groups[k]!;
      const coefficients = new Float64Array(p);
      const degreesOfFreedom = new Float64Array(p);
      const covariance = new Float64Array(p * p);
      for (const [i, column] of order.entries()) {
        const s = i - own.length;
        coefficients[column] = s < 0 ? group.coefficients[i]! : fit.shared[s]!;
        degreesOfFreedom[column] = s < 0 ? group.degreesOfFreedom[i]! : fit.sharedDegreesOfFreedom[s]!;
        for (const [j, other] of order.entries()) {
          covariance[column * p + other] = group.covariance[i * p + j]!;
        }
      }
      return {
        night,
        rows: nightRows,
        coefficients,
        covariance,
        degreesOfFreedom,
        components: componentsOf(group),
        near: group.near,
        hasFrameScatter: groups[k]!.block !== null,
        chi2: chi2Of(problem, nightRows, group),
        conditionNumber: group.conditionNumber,
        priors: [...priors.filter(({ column }) => own.includes(column)), ...sharedPriors],
        converged: hasEnded(group.termination),
      };
    }),
  };
}

/** A night's part of r′V⁻¹r: V⁻¹r is the conditional residual over its variance (Henderson 1975, Biometrics 31, 423). */
function chi2Of({ sigma }: BandProblem, rows: Int32Array, group: GroupFit): number {
  const { observation } = componentsOf(group);
  let sum = 0;
  for (let i = 0; i < rows.length; i += 1) {
    const variance = sigma[rows[i]!]! ** 2 + observation;
    if (variance > 0) sum += (group.marginalResiduals[i]! * group.conditionalResiduals[i]!) / variance;
  }
  return sum;
}
