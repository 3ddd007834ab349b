/**
 * The mixed model of one band (lib/numerics) asked with the rows of a problem, and its answer night by night.
 */
import { type Prior } from '@/lib/numerics/generalised-least-squares';
import { fitMixedModel } from '@/lib/numerics/mixed-model';
import { type Components } from '@/lib/numerics/mixed-noise';
import { designOf, type BandProblem } from './band-problem';
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
  /** Whether some frame has two rows, so that its scatter can be told from that of observations. */
  readonly hasFrameScatter: boolean;
  readonly chi2: number;
  readonly conditionNumber: number;
  /** Of each row, shape (n) [1]. */
  readonly leverage: Float64Array;
  /** What the other nights and the model say of this night's coefficients beforehand. */
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
  const nights = [...new Set(Array.from(rows, (row) => problem.night[row]!))].sort((a, b) => a - b);
  return nights.map((night) => ({ night, rows: rows.filter((row) => problem.night[row] === night) }));
}

/** Whether some frame has two of the rows.
 * @param problem - of the band
 * @param rows - numbers of rows, shape (m) [1]
 * @returns true when one has
 * @source definition */
export function sharesFrames(problem: BandProblem, rows: Int32Array): boolean {
  return new Set(Array.from(rows, (row) => problem.frame[row]!)).size < rows.length;
}

/** Fits a band by restricted maximum likelihood.
 * @param problem - of the band
 * @param rows - numbers of rows that take part, shape (m) [1]
 * @returns the fit of every night that has rows, or what cannot be told apart
 * @throws {RangeError} for several nights
 * @accuracy as lib/numerics/mixed-model
 * @source see there */
export function fitBand(problem: BandProblem, rows: Int32Array): BandFit {
  // Each night has a zero point of its own: taken as one night, several would give wrong numbers.
  if (problem.nights > 1) throw new RangeError('Several nights cannot be fitted jointly yet.');
  const hasFrameScatter = sharesFrames(problem, rows);
  const priors = modelPriors(problem);
  const fit = fitMixedModel({
    response: pick(problem.response, rows),
    design: designOf(problem, rows),
    columns: problem.sought.length,
    sigma: pick(problem.sigma, rows),
    subject: rows.map((row) => problem.star[row]!),
    subjectSigma: problem.starSigma.map((sigma) => (Number.isFinite(sigma) ? sigma : 0)),
    block: hasFrameScatter ? blocksOf(problem, rows) : null,
    observationScatter: { kind: 'estimate' },
    blockScatter: { kind: 'estimate' },
    priors,
  });
  if (fit.kind === 'undetermined') {
    const names = problem.sought.map(({ name }) => name);
    return { ...fit, dependent: fit.dependent.map((set) => set.map((column) => names[column]!)) };
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
        components: { observation: fit.observationScatter.sigma ** 2, block: fit.blockScatter.sigma ** 2 },
        hasFrameScatter,
        chi2: fit.chi2,
        conditionNumber: fit.conditionNumber,
        leverage: fit.leverage,
        priors,
        converged: ['converged', 'fixed', 'no-freedom'].includes(fit.termination.reason),
      },
    ],
  };
}
