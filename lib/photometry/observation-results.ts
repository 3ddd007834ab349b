/** What a fit says of every observation that it was given. */
import { colourForBand, magnitudeInBand } from './bands';
import { designOf, rowsOfNight, type BandProblem, type MissingRow } from './band-problem';
import { fainterOrBrighter } from './finding-words';
import { type NightFit } from './fit-band';
import { observationReasons, type BandSolution, type ObservationResults } from './night-solution';
import { viewNight, type NightView } from './night-view';
import { type Rejection, type RowVerdict } from './reject-observations';
import { type Structure } from './rejection-structures';
import { overrules, type StandardObservations } from './standard-observations';
import { whiten } from '@/lib/numerics/mixed-noise';

type Writable = { -readonly [K in keyof ObservationResults]: ObservationResults[K] } & {
  reasonWords: string[];
};

/** Results before any fit: nothing is used, and the reason is that no band of the model is theirs.
 * @param observations - as given, n of them
 * @returns results to be filled
 * @source definition */
export function emptyResults(observations: StandardObservations): Writable {
  const { band, star, standards } = observations;
  const n = band.length;
  const unknown = (): Float64Array => new Float64Array(n).fill(Number.NaN);
  return {
    colour: Float64Array.from(band, (b, o) => colourForBand(standards, star[o]!, b)),
    magnitude: Float64Array.from(band, (b, o) => magnitudeInBand(standards, star[o]!, b)),
    residual: unknown(),
    standardised: unknown(),
    weight: new Float64Array(n),
    leverage: unknown(),
    influence: unknown(),
    used: new Uint8Array(n),
    reason: new Uint8Array(n).fill(observationReasons['not-fitted']),
    reasonWords: new Array<string>(n).fill('Its band is not in the model.'),
  };
}

/** Records observations that could not enter.
 * @param results - to be filled
 * @param missing - observations and why
 * @source definition */
export function recordMissing(results: Writable, missing: readonly MissingRow[]): void {
  for (const { observation, reason, words } of missing) {
    results.reason[observation] = observationReasons[reason];
    results.reasonWords[observation] = words;
  }
}

/** Records observations of bands that are not determined.
 * @param results - to be filled
 * @param problem - of the band
 * @param bands - its outcome per night
 * @source definition */
export function recordUnfitted(
  results: Writable,
  problem: BandProblem,
  bands: readonly BandSolution[],
): void {
  const undetermined = new Set(
    bands.filter(({ outcome }) => outcome === 'undetermined').map(({ night }) => night),
  );
  for (let row = 0; row < problem.observation.length; row += 1) {
    if (!undetermined.has(problem.night[row]!)) continue;
    const o = problem.observation[row]!;
    const isOut = problem.overrule[row] === overrules.keepOut;
    results.reason[o] = observationReasons[isOut ? 'person' : 'not-fitted'];
    results.reasonWords[o] = isOut
      ? 'A person keeps it out.'
      : 'The coefficients of its band cannot be determined.';
  }
}

/** Records what a fit says of its rows, used and not.
 * @param results - to be filled
 * @param observations - for the names of stars and frames
 * @param problem - of the band
 * @param rejection - the fit
 * @accuracy residuals: rounding
 * @source influence: Cook 1977, Technometrics 19, 15, in its form for correlated errors (Christensen, Pearson and
 * Johnson 1992, Technometrics 34, 38) */
export function recordFit(
  results: Writable,
  observations: StandardObservations,
  problem: BandProblem,
  rejection: Rejection,
): void {
  if (rejection.fit.kind !== 'determined') return;
  for (const fit of rejection.fit.nights) {
    const view = viewNight(problem, fit.rows, fit.components, fit.priors);
    const places = new Map(Array.from(fit.rows, (row, i) => [row, i] as const));
    for (const row of rowsOfNight(problem, fit.night)) {
      const o = problem.observation[row]!;
      const isUsed = places.has(row);
      const { residual, error } = residualOf(problem, fit, row, isUsed);
      results.residual[o] = residual;
      results.standardised[o] = residual / error;
      results.weight[o] = rejection.weights[row]!;
      results.used[o] = isUsed ? 1 : 0;
      const verdict = rejection.verdicts[row] ?? { kind: 'believed' };
      const isOut = problem.overrule[row] === overrules.keepOut;
      results.reason[o] = observationReasons[isUsed ? 'used' : isOut ? 'person' : reasonOf(verdict)];
      results.reasonWords[o] = isUsed
        ? ''
        : isOut
          ? `A person keeps it out; the fit would ${verdict.kind === 'believed' ? 'use it' : 'reject it too'}.`
          : verdictWords(verdict, observations);
    }
    if (view !== null) recordInfluence(results, view);
  }
}

/** y − Xβ and its standard error: coefficients and residual of a used row go together, so their variances subtract. */
function residualOf(
  problem: BandProblem,
  fit: NightFit,
  row: number,
  isUsed: boolean,
): { readonly residual: number; readonly error: number } {
  const own = designOf(problem, Int32Array.of(row));
  const p = own.length;
  let residual = problem.response[row]!;
  let explained = 0;
  for (let j = 0; j < p; j += 1) {
    residual -= own[j]! * fit.coefficients[j]!;
    for (let k = 0; k < p; k += 1) explained += own[j]! * fit.covariance[j * p + k]! * own[k]!;
  }
  const noise =
    problem.sigma[row]! ** 2 +
    problem.starSigma[problem.star[row]!]! ** 2 +
    fit.components.observation +
    fit.components.block;
  // A row that nearly alone determines a coefficient has a residual near zero: rounding must not make its variance negative.
  const variance = isUsed ? Math.max(noise - explained, 1e-12 * noise) : noise + explained;
  return { residual, error: Math.sqrt(variance) };
}

function recordInfluence(results: Writable, view: NightView): void {
  const { problem, rows, design, inverse, projection, v, noise } = view;
  const n = rows.length;
  const p = problem.sought.length;
  const leverage = new Float64Array(n);
  for (let k = 0; k < p; k += 1) {
    const combination = new Float64Array(n);
    for (let j = 0; j < p; j += 1) {
      for (let i = 0; i < n; i += 1) combination[i]! += inverse[k * p + j]! * design[j * n + i]!;
    }
    whiten(noise, combination).forEach((value, i) => (leverage[i]! += value * value));
  }
  for (let i = 0; i < n; i += 1) {
    const o = problem.observation[rows[i]!]!;
    results.leverage[o] = leverage[i]!;
    const own = projection.diagonal[i]!;
    const moved = (v[i]! / own) ** 2 * (projection.inverseDiagonal[i]! - own);
    results.influence[o] = p > 0 ? moved / p : 0;
  }
}

const reasonOf = (verdict: RowVerdict): 'outlier' | 'star' | 'frame' | 'run' =>
  verdict.kind === 'structure' ? verdict.structure.kind : 'outlier';

/** Why a row is rejected, a whole sentence.
 * @param verdict - of the fit
 * @param observations - for the names of stars and frames
 * @returns words; empty for a row that is believed
 * @source definition */
export function verdictWords(verdict: RowVerdict, observations: StandardObservations): string {
  if (verdict.kind === 'believed') return '';
  if (verdict.kind === 'structure') return `${structureWords(verdict.structure, observations)}.`;
  return `It is ${fainterOrBrighter(verdict.shift)} than the other observations predict, ${distanceWords(verdict)}.`;
}

/** How far off something lies, and how far it might. */
function distanceWords({ shift, error, limit }: Pick<Structure, 'shift' | 'error' | 'limit'>): string {
  return `${Math.abs(shift / error).toFixed(1)} standard errors from the fit; the limit is ${limit.toFixed(1)}`;
}

/** What a structure is, without its end.
 * @param structure - star, frame or run
 * @param observations - for the names of stars and frames
 * @returns words without a full stop
 * @source definition */
export function structureWords(structure: Structure, observations: StandardObservations): string {
  const { starNames, frameNumbers } = observations;
  const { kind, shift, rows } = structure;
  const numbers = structure.frames.map((frame) => frameNumbers[frame]!);
  const what =
    kind === 'star'
      ? `Star ${starNames[structure.star]!}`
      : kind === 'frame'
        ? `Frame ${numbers[0]!}`
        : `Frames ${numbers[0]!} to ${numbers.at(-1)!}, one after the other,`;
  const verb = kind === 'run' ? 'are' : 'is';
  return `${what} ${verb} as a whole ${fainterOrBrighter(shift)} than all others predict, in ${rows.length} observations that agree with each other, ${distanceWords(structure)}`;
}
