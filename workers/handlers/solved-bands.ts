import { toApiName } from '@/lib/contracts/coefficients';
import { bandOrder, type BandName } from '@/lib/photometry/bands';
import type { BandSolution, FittedCoefficient, NightSolution } from '@/lib/photometry/night-solution';
import type { SolvedNight } from '@/lib/server/acts/record-solution';
import type { SolveInputs } from '@/lib/server/reads/solve-inputs';

type StoredBand = SolvedNight['bands'][number];
type Finding = SolvedNight['findings'][number];

const colourIndices: Readonly<Record<BandName, string>> = { U: 'UB', B: 'BV', V: 'BV', R: 'VR', I: 'VI' };
const hour_ms = 3_600_000;

/** The bands of a solution in the form in which they are stored. */
export function solvedBands(
  solution: NightSolution,
  { nights, observations }: SolveInputs,
): readonly StoredBand[] {
  return solution.bands.map((band) => {
    const night = nights[band.night];
    if (!night) throw new Error(`The fit names a night ${band.night} that it was not given.`);
    const instant = (hours: number | undefined): Date | null =>
      hours === undefined || night.utcZero === null
        ? null
        : new Date(night.utcZero.getTime() + hours * hour_ms);
    return {
      nightId: night.id,
      band: band.band,
      colourIndex: colourIndices[band.band],
      outcome: band.outcome,
      covariance: square(band.covariance, (value) => value),
      correlation: square(band.correlation, finite),
      scatterObservation: band.scatter.observation,
      scatterFrame: band.scatter.frame,
      nUsed: band.nUsed,
      nRejected: band.nRejected,
      nStars: band.nStars,
      nFrames: band.nFrames,
      dof: band.dof,
      reducedChi2: band.reducedChi2,
      conditionNumber: band.conditionNumber === null ? null : finite(band.conditionNumber),
      airmassMin: band.airmass?.min ?? null,
      airmassMax: band.airmass?.max ?? null,
      colourMin: band.colour?.min ?? null,
      colourMax: band.colour?.max ?? null,
      utcFirst: instant(band.hours?.min),
      utcLast: instant(band.hours?.max),
      leaveOneStarOut: band.leaveOneStarOut,
      driftValue: band.driftTest?.value ?? null,
      driftError: band.driftTest?.error ?? null,
      runs: band.runsTest,
      crossChecks: crossChecks(band, observations.starNames),
      warnings: solution.findings
        .filter((finding) => finding.band === band.band && (finding.night ?? band.night) === band.night)
        .map(({ reason, remedy }) => (remedy === '' ? reason : `${reason} ${remedy}`)),
      coefficients: band.coefficients.map(storedCoefficient),
    };
  });
}

const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);

/** The rows of a square matrix that is given row by row. */
function square<T>(matrix: Float64Array, cell: (value: number) => T): readonly (readonly T[])[] {
  const size = Math.sqrt(matrix.length);
  return Array.from({ length: size }, (_, row) =>
    Array.from(matrix.subarray(row * size, (row + 1) * size), cell),
  );
}

function storedCoefficient(coefficient: FittedCoefficient): StoredBand['coefficients'][number] {
  const { name, term, value, error, interval95, varianceInflation } = coefficient;
  return {
    name: toApiName(name),
    status: term.status,
    value,
    error,
    interval95,
    varianceInflation,
    priorValue: term.status === 'prior' ? term.value : null,
    priorError: term.status === 'prior' ? term.error : null,
  };
}

function crossChecks(
  { crossChecks: checks }: BandSolution,
  starNames: readonly string[],
): StoredBand['crossChecks'] {
  return {
    bouguer: checks.bouguer.map(({ star, ...line }) => ({ star: starNames[star] ?? '', ...line })),
    high_low: checks.highLow,
    colour_pairs: checks.colourPairs && {
      colour_term: checks.colourPairs.colourTerm,
      error: checks.colourPairs.error,
      n: checks.colourPairs.n,
    },
  };
}

/** Findings of the fit, with nights and coefficients as the interface names them. */
export function solvedFindings(solution: NightSolution, { nights }: SolveInputs): readonly Finding[] {
  return solution.findings.map(({ night, coefficient, ...finding }) => ({
    ...finding,
    night_date: night === null ? null : (nights[night]?.date ?? null),
    coefficient: coefficient === null ? null : toApiName(coefficient),
  }));
}

export const bandOf = (place: number): BandName => {
  const band = bandOrder[place];
  if (band === undefined) throw new Error(`There is no band ${place}.`);
  return band;
};
