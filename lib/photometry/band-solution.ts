/**
 * The outcome of one band of one night in the form in which it is stored. Symbols as in night-view.ts.
 *
 * Degrees of freedom of a coefficient's interval are Satterthwaite's (lib/numerics/mixed-diagnostics), which may be too
 * many where a scatter is estimated as zero. They are therefore held to at most n − p, and for coefficients that only
 * differ between frames to at most the number of frames less the number of such coefficients: the containment method
 * (Schluchter and Elashoff 1990, Journal of Statistical Computation and Simulation 37, 69).
 */
import { factorCholesky, invertCholesky } from '@/lib/numerics/cholesky';
import { studentTLimit } from '@/lib/numerics/student-t';
import { nightCoefficients, type BandProblem } from './band-problem';
import { freeCoefficients, rangeOf } from './determination';
import { type NightFit } from './fit-band';
import { coefficientOrder, type CoefficientName } from './fit-model';
import { type BandSolution, type FittedCoefficient } from './night-solution';

/** What a band's own fit does not give: checks made beside it. */
export type SideResults = Pick<BandSolution, 'leaveOneStarOut' | 'driftTest' | 'runsTest' | 'crossChecks'>;

type Counts = Pick<
  BandSolution,
  'band' | 'night' | 'nUsed' | 'nRejected' | 'nStars' | 'nFrames' | 'airmass' | 'colour' | 'hours'
>;

const distinct = (of: Int32Array, rows: Int32Array): number =>
  new Set(Array.from(rows, (row) => of[row]!)).size;

function countRows(problem: BandProblem, night: number, rows: Int32Array, nRejected: number): Counts {
  return {
    band: problem.band,
    night,
    nUsed: rows.length,
    nRejected,
    nStars: distinct(problem.star, rows),
    nFrames: distinct(problem.frame, rows),
    airmass: rangeOf(problem.airmass, rows),
    colour: rangeOf(problem.colour, rows),
    hours: rangeOf(problem.hours, rows),
  };
}

const modelCoefficients = ({ model }: BandProblem): readonly Pick<FittedCoefficient, 'name' | 'term'>[] =>
  coefficientOrder.flatMap((name) => {
    const term = model.terms[name];
    return term === undefined ? [] : [{ name, term }];
  });

/** A band of a night that gives no numbers. Its counts and ranges are those of the rows that could have been used.
 * @param problem - of the band
 * @param night - place of the night [1]
 * @param rows - of the night that could be used, shape (m) [1]
 * @returns the outcome, every value null
 * @source definition */
export function undeterminedSolution(problem: BandProblem, night: number, rows: Int32Array): BandSolution {
  return {
    ...countRows(problem, night, rows, 0),
    outcome: 'undetermined',
    coefficients: modelCoefficients(problem).map(({ name, term }) => ({
      name,
      term,
      value: null,
      error: null,
      interval95: null,
      varianceInflation: null,
    })),
    covariance: new Float64Array(0),
    correlation: new Float64Array(0),
    scatter: { observation: null, frame: null },
    dof: null,
    reducedChi2: null,
    conditionNumber: null,
    leaveOneStarOut: null,
    driftTest: null,
    runsTest: null,
    crossChecks: { bouguer: [], highLow: null, colourPairs: null },
  };
}

/** A band of a night that is determined.
 * @param problem - of the band
 * @param fit - of the night
 * @param nRejected - rows of the night that had all values and were not used [1]
 * @param side - checks made beside the fit
 * @returns the outcome
 * @accuracy as the fit
 * @source see the head */
export function determinedSolution(
  problem: BandProblem,
  fit: NightFit,
  nRejected: number,
  side: SideResults,
): BandSolution {
  const all = modelCoefficients(problem);
  const p = problem.sought.length;
  const places = all.map(({ name }) => problem.sought.findIndex((one) => one.name === name));
  const size = all.length;
  const covariance = new Float64Array(size * size);
  const correlation = new Float64Array(size * size).fill(Number.NaN);
  for (let i = 0; i < size; i += 1) {
    for (let j = 0; j < size; j += 1) {
      const [a, b] = [places[i]!, places[j]!];
      if (a < 0 || b < 0) continue;
      covariance[i * size + j] = fit.covariance[a * p + b]!;
      correlation[i * size + j] =
        i === j
          ? 1
          : fit.covariance[a * p + b]! / Math.sqrt(fit.covariance[a * p + a]! * fit.covariance[b * p + b]!);
    }
  }
  const inflation = varianceInflation(problem, fit.covariance);
  const dof = fit.rows.length - freeCoefficients(problem).length;
  const coefficients = all.map(({ name, term }, i): FittedCoefficient => {
    const at = places[i]!;
    if (term.status === 'fixed')
      return { name, term, value: term.value, error: 0, interval95: 0, varianceInflation: null };
    const error = Math.sqrt(fit.covariance[at * p + at]!);
    return {
      name,
      term,
      value: fit.coefficients[at]!,
      error,
      interval95: error * studentTLimit(0.05, degreesOf(problem, fit, at)),
      varianceInflation: inflation[at]!,
    };
  });
  return {
    ...countRows(problem, fit.night, fit.rows, nRejected),
    outcome: 'determined',
    coefficients,
    covariance,
    correlation,
    scatter: {
      observation: Math.sqrt(fit.components.observation),
      frame: fit.hasFrameScatter ? Math.sqrt(fit.components.block) : null,
    },
    dof,
    reducedChi2: dof > 0 ? fit.chi2 / dof : null,
    conditionNumber: fit.conditionNumber,
    ...side,
  };
}

function degreesOf(problem: BandProblem, fit: NightFit, column: number): number {
  const free = freeCoefficients(problem);
  const most = Math.max(1, fit.rows.length - free.length);
  const isOfFrames = nightCoefficients.includes(problem.sought[column]!.name);
  const between = Math.max(
    1,
    distinct(problem.frame, fit.rows) - free.filter((name) => nightCoefficients.includes(name)).length,
  );
  return Math.min(
    fit.degreesOfFreedom[column]!,
    isOfFrames && fit.hasFrameScatter ? Math.min(most, between) : most,
  );
}

/** Variance of each coefficient over what it would be if no other coefficient but the zero point were sought: columns
 * are thereby compared about their means. Null for the zero point itself. */
function varianceInflation({ sought }: BandProblem, covariance: Float64Array): readonly (number | null)[] {
  const p = sought.length;
  const errors = sought.map((_, i) => Math.sqrt(covariance[i * p + i]!));
  const scaled = covariance.map((value, at) => value / (errors[Math.floor(at / p)]! * errors[at % p]!));
  factorCholesky(scaled, p);
  // Information, in units in which every variance is 1.
  const information = invertCholesky(scaled, p);
  const zero = sought.findIndex(({ name }: { readonly name: CoefficientName }) => name === 'zeroPoint');
  return sought.map((_, j) => {
    if (j === zero) return null;
    const own = information[j * p + j]!;
    if (zero < 0) return own;
    return own - information[zero * p + j]! ** 2 / information[zero * p + zero]!;
  });
}
