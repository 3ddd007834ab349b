/** What a person should know about a fit that gave numbers, and about observations that could not enter one. */
import { rowsOfNight, type BandProblem, type MissingRow } from './band-problem';
import { coefficientWords, counted, fainterOrBrighter, figure, listed, sentence } from './finding-words';
import { type BandSolution, type Finding } from './night-solution';
import { structureWords } from './observation-results';
import { type Rejection } from './reject-observations';
import { type Structure } from './rejection-structures';
import { overrules, type StandardObservations } from './standard-observations';

/** Share of observations rejected that a good night hardly reaches. Our own rule. */
const manyRejected = 0.1;
/**
 * Variance inflation from which coefficients count as hard to tell apart. Common practice is 10; the product of airmass and
 * colour, in the model beside both, brings colour term and second order to 10 or 20 in every good night.
 */
const strongInflation = 30;
/** Errors by which a prior may differ from what the observations alone say. Our own rule. */
const priorSigmas = 3;
/** First-order extinction beyond which something else is being measured. Our own rule [mag per airmass] */
const largestExtinction = 1.5;

/** Findings on observations that lack what the fit needs.
 * @param problem - of the band
 * @param missing - observations and why
 * @param observations - for the names of nights
 * @returns one finding per night and reason
 * @source definition */
export function missingFindings(
  problem: BandProblem,
  missing: readonly MissingRow[],
  observations: StandardObservations,
): readonly Finding[] {
  const { band } = problem;
  const { night, nightNames } = observations;
  const counts = new Map<string, { night: number; words: string; n: number }>();
  for (const { observation, words } of missing) {
    const place = night[observation]!;
    const key = `${place} ${words}`;
    const known = counts.get(key);
    if (known === undefined) counts.set(key, { night: place, words, n: 1 });
    else known.n += 1;
  }
  return [...counts.values()].map(({ night: place, words, n }): Finding => {
    const where = nightNames.length > 1 ? `${band} on ${nightNames[place]!}` : band;
    return {
      weight: 'caution',
      kind: 'missing-values',
      band,
      night: place,
      coefficient: null,
      reason: `${sentence(counted(n, 'observation'))} in ${where} ${n === 1 ? 'was' : 'were'} left out: ${words.charAt(0).toLowerCase()}${words.slice(1)}`,
      remedy: 'Complete the table of standards or the measurements, or leave these stars out.',
    };
  });
}

/** Findings on a band that is determined.
 * @param problem - of the band
 * @param rejection - the fit and what became of its rows
 * @param solutions - outcome per night
 * @param observations - for names
 * @returns findings, by night
 * @source limits: our own rules and common practice, as named above */
export function determinedFindings(
  problem: BandProblem,
  rejection: Rejection,
  solutions: readonly BandSolution[],
  observations: StandardObservations,
): readonly Finding[] {
  const found: Finding[] = [];
  const { band } = problem;
  for (const solution of solutions.filter(({ outcome }) => outcome === 'determined')) {
    const { night } = solution;
    const where = observations.nightNames.length > 1 ? `${band} on ${observations.nightNames[night]!}` : band;
    const add = (weight: Finding['weight'], kind: Finding['kind'], reason: string, remedy = ''): void => {
      found.push({ weight, kind, band, night, coefficient: null, reason: sentence(reason), remedy });
    };
    for (const structure of rejection.structures) {
      if (problem.night[structure.rows[0]!] !== night) continue;
      add(
        'caution',
        `${structure.kind}-rejected`,
        `In ${where}: ${structureWords(structure, observations)}.`,
        structureRemedy(structure),
      );
    }
    if (solution.scatter.frame === null) {
      add(
        'note',
        'frame-scatter-dropped',
        `Every frame in ${where} has one star, so the scatter of frames cannot be told from that of observations; the latter holds both.`,
      );
    }
    const mine = rowsOfNight(problem, night);
    const usable = mine.filter((row) => problem.overrule[row] === overrules.none);
    const rejected = usable.filter((row) => (rejection.verdicts[row]?.kind ?? 'believed') !== 'believed');
    if (rejected.length > manyRejected * usable.length) {
      add(
        'caution',
        'many-rejected',
        `The fit rejects ${rejected.length} of ${counted(usable.length, 'observation')} in ${where}.`,
        'Look for cloud, wrong identifications or measurement errors that are too small.',
      );
    }
    found.push(...overruledFindings(problem, rejection, { night, where }));
    if (!rejection.converged) {
      add(
        'caution',
        'not-converged',
        `In ${where} the rejection of observations did not come to rest: some of them depend on each other.`,
        'Decide on the observations near the limit by hand.',
      );
    }
    found.push(...coefficientFindings(solution, where));
  }
  return found;
}

function structureRemedy({ kind, shift }: Structure): string {
  switch (kind) {
    case 'star':
      return 'Check the identification of the star and whether it is variable; keep it in if it is right.';
    case 'frame':
      return 'Check the frame for cloud, its exposure time and its filter; keep it in if it is right.';
    case 'run':
      return shift > 0
        ? 'Compare the time with the log: a bank of cloud is likely. Do not use target frames of that time without care.'
        : 'Compare the time with the log: something changed, such as focus, aperture or exposure time.';
  }
}

function overruledFindings(
  problem: BandProblem,
  rejection: Rejection,
  { night, where }: { readonly night: number; readonly where: string },
): readonly Finding[] {
  const mine = rowsOfNight(problem, night);
  const against = (row: number): boolean => (rejection.verdicts[row]?.kind ?? 'believed') !== 'believed';
  const out = mine.filter((row) => problem.overrule[row] === overrules.keepOut);
  const kept = mine.filter((row) => problem.overrule[row] === overrules.keepIn);
  const finding = (reason: string): Finding => ({
    weight: 'note',
    kind: 'overruled',
    band: problem.band,
    night,
    coefficient: null,
    reason: sentence(reason),
    remedy: '',
  });
  const found: Finding[] = [];
  const would = (n: number, verb: string): string =>
    n === 0 ? `the fit would ${verb} none of them` : `the fit would ${verb} ${n} of them`;
  if (out.length > 0) {
    const n = out.filter((row) => !against(row)).length;
    found.push(
      finding(
        `In ${where} a person keeps ${counted(out.length, 'observation')} out of the fit; ${would(n, 'use')}.`,
      ),
    );
  }
  if (kept.length > 0) {
    const outliers = kept.filter(against);
    const shifts = [...outliers].flatMap((row) => {
      const verdict = rejection.verdicts[row];
      return verdict?.kind === 'outlier' ? [fainterOrBrighter(verdict.shift)] : [];
    });
    const spelt = shifts.length > 0 && shifts.length < 4 ? ` (${listed(shifts)} than predicted)` : '';
    found.push(
      finding(
        `In ${where} a person keeps ${counted(kept.length, 'observation')} in the fit; ${would(outliers.length, 'reject')}${spelt}.`,
      ),
    );
  }
  return found;
}

function coefficientFindings(solution: BandSolution, where: string): readonly Finding[] {
  const { band, night, coefficients } = solution;
  const found: Finding[] = [];
  for (const { name, term, value, error, varianceInflation } of coefficients) {
    if (value === null || error === null || term.status === 'fixed') continue;
    const words = coefficientWords[name];
    const add = (kind: Finding['kind'], reason: string, remedy: string): void => {
      found.push({ weight: 'caution', kind, band, night, coefficient: name, reason, remedy });
    };
    if (varianceInflation !== null && varianceInflation > strongInflation) {
      add(
        'correlated',
        `The ${words} in ${where} is hard to tell from the other coefficients: they raise its variance ${varianceInflation.toFixed(0)} times.`,
        'Observe standards of every colour at low and high altitude, early and late, or fix a coefficient.',
      );
    }
    if (name === 'extinction' && (value < 0 || value > largestExtinction)) {
      add(
        'suspicious-extinction',
        `The extinction in ${where} is ${figure(value, 3)} ± ${error.toFixed(3)} mag per airmass: ${value < 0 ? 'no air brightens stars' : 'more than clear air can dim'}.`,
        'Look for a change of transparency during the night, and for a drift.',
      );
    }
    if (term.status === 'prior' && error < term.error) {
      // Difference between prior and observations: the outcome lies between them as their weights are.
      const sigmas = Math.abs(value - term.value) / Math.sqrt(term.error ** 2 - error ** 2);
      if (sigmas > priorSigmas) {
        add(
          'prior-disagrees',
          `The ${words} in ${where} was known beforehand as ${String(term.value).replace('-', '−')} ± ${term.error}, but with the observations it is ${figure(value, 4)} ± ${error.toFixed(4)}: they differ by ${sigmas.toFixed(1)} standard errors.`,
          'Check whether the prior belongs to this equipment and site, or free the coefficient.',
        );
      }
    }
  }
  return found;
}
