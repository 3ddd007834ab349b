/**
 * The fit of one or several nights: what a job calls with columns and stores as it comes back. The model and its symbols
 * stand in transformation-model.ts; each band is a fit of its own.
 *
 * | step | file |
 * |---|---|
 * | rows of a band; observations without what the fit needs | band-problem.ts |
 * | what they can determine at all | determination.ts |
 * | robust start, mixed model, rejection until nothing changes | robust-start.ts, fit-band.ts, reject-observations.ts |
 * | what the rest can determine | determination.ts |
 * | checks beside the fit | side-results.ts, cross-checks.ts |
 * | outcome per band and night, every observation's part in it, findings | band-solution.ts, observation-results.ts, fit-findings.ts |
 *
 * The caller sees to it that published errors are known: an observation of a star without one is not fitted, because to
 * take it as exact, or to make one up, would be a decision on science (0.003 mag is common practice, no source).
 */
import { bandProblem, rowsOfNight, type BandProblem, type MissingRow } from './band-problem';
import { determinedSolution, undeterminedSolution } from './band-solution';
import { nightFindings, rankFindings, sharedFindings, type DeterminationOptions } from './determination';
import { rowsByNight } from './fit-band';
import { determinedFindings, missingFindings } from './fit-findings';
import { type BandModel, type FitModel } from './fit-model';
import { type BandSolution, type Finding, type NightSolution } from './night-solution';
import { emptyResults, recordFit, recordMissing, recordUnfitted } from './observation-results';
import { fitBelieved, type Rejection } from './reject-observations';
import { sideResults } from './side-results';
import { overrules, type StandardObservations } from './standard-observations';

/** Solves the bands of a model for one night, or for several nights jointly: zero point, extinction and their drifts are
 * each night's own, colour terms and second-order extinction are shared.
 * @param observations - of standard stars, as standard-observations.ts says [mag, airmass, h]
 * @param model - bands, terms, limits and seed
 * @returns coefficients per band and night, what became of every observation, and findings in words
 * @throws {RangeError} when columns disagree in length or name a night, star, frame or band that is not there
 * @accuracy coefficients 1e-8 relative at given components; the same input gives the same numbers, in any order of the
 * observations up to rounding
 * @source design of this program; methods are named in the files above */
export function solveNights(observations: StandardObservations, model: FitModel): NightSolution {
  requireColumns(observations);
  const results = emptyResults(observations);
  const bands: BandSolution[] = [];
  const findings: Finding[] = [];
  for (const bandModel of model.bands) {
    const { problem, missing } = bandProblem(observations, bandModel);
    recordMissing(results, missing);
    const outcome = solveBand(observations, model, { problem, missing, bandModel });
    if (outcome.rejection !== null) recordFit(results, observations, problem, outcome.rejection);
    recordUnfitted(results, problem, outcome.bands);
    bands.push(...outcome.bands);
    findings.push(...outcome.findings);
  }
  bands.sort((a, b) => a.night - b.night);
  return {
    outcome: bands.every(({ outcome }) => outcome === 'determined') ? 'determined' : 'undetermined',
    bands,
    observations: results,
    findings,
  };
}

interface BandInput {
  readonly problem: BandProblem;
  readonly missing: readonly MissingRow[];
  readonly bandModel: BandModel;
}

interface BandOutcome {
  readonly bands: readonly BandSolution[];
  readonly findings: readonly Finding[];
  readonly rejection: Rejection | null;
}

function solveBand(
  observations: StandardObservations,
  { limits, seed }: FitModel,
  { problem, missing }: BandInput,
): BandOutcome {
  const findings: Finding[] = [...missingFindings(problem, missing, observations)];
  const every = Int32Array.from(problem.observation, (_, row) => row);
  const options = { limits, nightNames: observations.nightNames };
  const isUsable = (row: number): boolean => problem.overrule[row] !== overrules.keepOut;
  const standing = new Set(observations.nightNames.keys());
  const rowsStanding = (): Int32Array => every.filter((row) => standing.has(problem.night[row]!));
  const stops = stopsOf(problem, standing, every.filter(isUsable), { ...options, rowsAre: 'usable' });
  findings.push(...stops);
  let rejection: Rejection | null = null;
  while (standing.size > 0) {
    const attempt = fitBelieved(problem, rowsStanding(), { limits, seed });
    const after =
      attempt.fit.kind === 'undetermined'
        ? dependentFindings(problem, attempt.fit, standing)
        : stopsOf(problem, standing, attempt.used, { ...options, rowsAre: 'used' });
    findings.push(...after);
    if (after.length > 0) continue;
    rejection = attempt;
    break;
  }
  const fits = rejection?.fit.kind === 'determined' ? rejection.fit.nights : [];
  const solutions = observations.nightNames.map((_, night): BandSolution => {
    const own = rowsOfNight(problem, night);
    const fit = fits.find((one) => one.night === night);
    if (fit === undefined) return undeterminedSolution(problem, night, own.filter(isUsable));
    return determinedSolution(problem, fit, own.length - fit.rows.length, sideResults(problem, fit));
  });
  if (rejection !== null) findings.push(...determinedFindings(problem, rejection, solutions, observations));
  return { bands: solutions, findings, rejection };
}

/** What cannot be determined; nights that fall are taken from those that stand. */
function stopsOf(
  problem: BandProblem,
  standing: Set<number>,
  rows: Int32Array,
  options: DeterminationOptions,
): readonly Finding[] {
  const found: Finding[] = [];
  const byNight = new Map(rowsByNight(problem, rows).map((one) => [one.night, one.rows] as const));
  for (const night of [...standing]) {
    const own = byNight.get(night) ?? new Int32Array(0);
    const stops = nightFindings(problem, own, night, options);
    if (stops.length === 0) continue;
    found.push(...stops);
    standing.delete(night);
  }
  if (problem.nights > 1 && standing.size === 0) return found;
  const shared = sharedFindings(
    problem,
    problem.nights > 1 ? rows.filter((row) => standing.has(problem.night[row]!)) : rows,
    options,
  );
  if (shared.length > 0) standing.clear();
  return [...found, ...shared];
}

function dependentFindings(
  problem: BandProblem,
  fit: Extract<Rejection['fit'], { kind: 'undetermined' }>,
  standing: Set<number>,
): readonly Finding[] {
  standing.clear();
  if (fit.reason === 'inseparable') return rankFindings(problem, fit.dependent);
  return [
    {
      weight: 'stop',
      kind: 'too-few-observations',
      band: problem.band,
      night: problem.nights === 1 ? 0 : null,
      coefficient: null,
      reason: `${problem.band} has observations without an error, and none to spare from which their scatter could be found.`,
      remedy: 'Give the errors of the measurements, or add observations.',
    },
  ];
}

function requireColumns(observations: StandardObservations): void {
  const { night, star, frame, band, instMag, instErr, airmass, hours, overrule } = observations;
  const n = band.length;
  for (const column of [night, star, frame, instMag, instErr, airmass, hours, overrule]) {
    if (column.length !== n) throw new RangeError('The columns of the observations differ in length.');
  }
  const within = (places: ArrayLike<number>, count: number, what: string): void => {
    for (let o = 0; o < n; o += 1) {
      if (!(places[o]! < count)) throw new RangeError(`Observation ${o} names a ${what} that is not there.`);
    }
  };
  within(night, observations.nightNames.length, 'night');
  within(star, observations.starNames.length, 'star');
  within(frame, observations.frameNumbers.length, 'frame');
  within(band, 5, 'band');
  for (const columns of [observations.standards, observations.standardErrors]) {
    for (const column of Object.values(columns) as Float64Array[]) {
      if (column.length !== observations.starNames.length)
        throw new RangeError('The list of stars and their published values differ in length.');
    }
  }
}
