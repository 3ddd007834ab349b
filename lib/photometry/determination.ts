/**
 * What the rows of a band can determine, before and after some of them are rejected. Nothing is guessed: where a term
 * has too little to stand on, the finding says which, why with the figures, and what would help.
 *
 * | term | needs |
 * |---|---|
 * | zero point, extinction, their drifts, free | frames: as many as there are such terms, and one more where frames are shared and their scatter is sought |
 * | extinction, its drift and second order, free | range of airmass ≥ limit in its night |
 * | colour term, quadratic one, second-order extinction, free | range of colour ≥ limit over the nights that share it; stars: one more than there are free terms in colour alone |
 * | all free terms | more observations than terms |
 */
import { colourCoefficients, nightCoefficients, type BandProblem } from './band-problem';
import { colourIndexWords, coefficientWords, counted, listed, sentence, figure } from './finding-words';
import { rowsByNight, sharesFrames } from './fit-band';
import { type CoefficientName, type FitLimits } from './fit-model';
import { type Finding, type Range } from './night-solution';

const airmassCoefficients: readonly CoefficientName[] = [
  'extinction',
  'secondOrderExtinction',
  'extinctionDrift',
];

/** Smallest and largest of some rows' values.
 * @param values - of all rows, shape (n)
 * @param rows - numbers of rows, shape (m) [1]
 * @returns the range; null without a finite value
 * @source definition */
export function rangeOf(values: Float64Array, rows: Int32Array): Range | null {
  let [min, max] = [Infinity, -Infinity];
  for (const row of rows) {
    const value = values[row]!;
    if (!Number.isFinite(value)) continue;
    min = Math.min(min, value);
    max = Math.max(max, value);
  }
  return min > max ? null : { min, max };
}

const extentOf = (range: Range | null): number => (range === null ? 0 : range.max - range.min);

const distinct = (of: Int32Array, rows: Int32Array): number =>
  new Set(Array.from(rows, (row) => of[row]!)).size;

/** Coefficients that nothing but the observations determines.
 * @param problem - of the band
 * @returns names, in coefficientOrder
 * @source definition */
export function freeCoefficients(problem: BandProblem): readonly CoefficientName[] {
  return problem.sought.filter(({ term }) => term.status === 'free').map(({ name }) => name);
}

export interface DeterminationOptions {
  readonly limits: FitLimits;
  readonly nightNames: readonly string[];
  /** What the rows are: "usable" before rejection, "used" after it. */
  readonly rowsAre: 'usable' | 'used';
}

/** Says what the rows of one night cannot determine.
 * @param problem - of the band
 * @param rows - of the night, shape (m) [1]
 * @param night - place of the night [1]
 * @param options - limits and words
 * @returns findings of weight stop; none where the night stands
 * @source see the head; limits: common practice, no source */
export function nightFindings(
  problem: BandProblem,
  rows: Int32Array,
  night: number,
  options: DeterminationOptions,
): readonly Finding[] {
  const { limits, nightNames, rowsAre } = options;
  const { band } = problem;
  const where = nightNames.length > 1 ? `${band} on ${nightNames[night]!}` : band;
  const stop = (
    kind: Finding['kind'],
    coefficient: CoefficientName | null,
    [reason, remedy]: readonly [string, string],
  ): Finding => ({ weight: 'stop', kind, band, night, coefficient, reason: sentence(reason), remedy });
  const free = freeCoefficients(problem);
  const own = free.filter((name) => nightCoefficients.includes(name));
  const isJoint = problem.nights > 1;
  const needed = isJoint ? own : free;
  if (rows.length <= needed.length) {
    return [
      stop('too-few-observations', null, [
        `${where} has ${counted(rows.length, `${rowsAre} observation`)} for ${counted(needed.length, 'free coefficient')}: at least ${needed.length + 1} are needed.`,
        rows.length === 0
          ? 'Observe standards in this band, or leave it out of the model.'
          : 'Add observations, or fix some of the coefficients or give them priors.',
      ]),
    ];
  }
  const found: Finding[] = [];
  const frames = distinct(problem.frame, rows);
  const forScatter = sharesFrames(problem, rows) ? 1 : 0;
  if (own.length > 0 && frames < own.length + forScatter) {
    const scatter = forScatter === 1 ? ', and one more is needed to see the scatter of frames' : '';
    found.push(
      stop('too-few-frames', own.at(-1)!, [
        `${where} has ${counted(frames, 'frame')} for ${listed(own.map((name) => coefficientWords[name]))}, which only differ from frame to frame${scatter}: at least ${own.length + forScatter} are needed.`,
        own.length > 1
          ? `Add frames, or fix the ${coefficientWords[own.at(-1)!]} or give it a prior, the extinction for instance at the site’s mean.`
          : 'Add frames of standards.',
      ]),
    );
  }
  const airmass = rangeOf(problem.airmass, rows);
  for (const name of free.filter((one) => airmassCoefficients.includes(one))) {
    if (isJoint && name === 'secondOrderExtinction') continue;
    if (extentOf(airmass) >= limits.airmassRange) continue;
    found.push(
      stop('airmass-range', name, [
        `The ${coefficientWords[name]} in ${where} cannot be determined: the airmasses of its ${rowsAre} observations, ${spelt(airmass)}, span ${extentOf(airmass).toFixed(2)}, less than ${limits.airmassRange.toFixed(2)}.`,
        name === 'extinction'
          ? 'Fix it at the site’s mean or give it as a prior, or observe standards at another altitude; joining another night does not help, for each night has its own extinction.'
          : `Fix the ${coefficientWords[name]} or give it a prior, or observe standards at another altitude.`,
      ]),
    );
  }
  return found;
}

/** Says what the nights of a band together cannot determine: the terms in colour.
 * @param problem - of the band
 * @param rows - of all nights, shape (m) [1]
 * @param options - limits and words
 * @returns findings of weight stop; none where the band stands
 * @source see the head; limits: common practice, no source */
export function sharedFindings(
  problem: BandProblem,
  rows: Int32Array,
  options: DeterminationOptions,
): readonly Finding[] {
  const { limits, rowsAre } = options;
  const { band } = problem;
  const nights = rowsByNight(problem, rows);
  const night = problem.nights === 1 ? 0 : null;
  const free = freeCoefficients(problem).filter((name) => colourCoefficients.includes(name));
  const inColour = free.filter((name) => name !== 'secondOrderExtinction');
  const found: Finding[] = [];
  const stars = distinct(problem.star, rows);
  if (stars < inColour.length + 1) {
    found.push({
      weight: 'stop',
      kind: 'too-few-stars',
      band,
      night,
      coefficient: inColour.at(-1) ?? null,
      reason: `${band} has ${counted(stars, 'star')}, and ${listed(inColour.map((name) => `the ${coefficientWords[name]}`))} needs at least ${inColour.length + 1} of different colours.`,
      remedy:
        'Observe further standards, or fix the colour term at the value recorded for the equipment or give it as a prior.',
    });
  }
  const colour = rangeOf(problem.colour, rows);
  for (const name of stars < inColour.length + 1 ? [] : free) {
    if (extentOf(colour) >= limits.colourRange) continue;
    found.push({
      weight: 'stop',
      kind: 'colour-range',
      band,
      night,
      coefficient: name,
      reason: `The ${coefficientWords[name]} in ${band} cannot be determined: ${colourIndexWords(band)} of its ${rowsAre} stars, ${spelt(colour)}, spans ${extentOf(colour).toFixed(2)} mag, less than ${limits.colourRange.toFixed(2)}.`,
      remedy: `Fix it at the value recorded for the equipment or give it as a prior, ${nights.length > 1 ? 'join further nights' : 'join another night'} with redder or bluer standards, or observe some.`,
    });
  }
  const airmassExtent = Math.max(0, ...nights.map((one) => extentOf(rangeOf(problem.airmass, one.rows))));
  if (problem.nights > 1 && free.includes('secondOrderExtinction') && airmassExtent < limits.airmassRange) {
    found.push({
      weight: 'stop',
      kind: 'airmass-range',
      band,
      night,
      coefficient: 'secondOrderExtinction',
      reason: `The second-order extinction in ${band} cannot be determined: in no night do the airmasses of its ${rowsAre} observations span more than ${airmassExtent.toFixed(2)}, less than ${limits.airmassRange.toFixed(2)}.`,
      remedy: 'Fix it or give it a prior, or join a night with standards at very different altitudes.',
    });
  }
  return found;
}

/** Says which coefficients the rows cannot tell apart.
 * @param problem - of the band
 * @param dependent - sets of coefficients
 * @returns a finding of weight stop for each set
 * @source rank of the design */
export function rankFindings(
  problem: BandProblem,
  dependent: readonly (readonly CoefficientName[])[],
): readonly Finding[] {
  const { band, nights } = problem;
  return dependent.map((set): Finding => {
    const names = set.map((name) => `the ${coefficientWords[name]}`);
    const [last] = set.slice(-1);
    return {
      weight: 'stop',
      kind: 'rank-deficient',
      band,
      night: nights === 1 ? 0 : null,
      coefficient: last ?? null,
      reason:
        names.length > 1
          ? `In ${band} the observations cannot tell ${listed(names)} apart: some combination of them is the same for all.`
          : `In ${band} the observations say nothing about ${names[0] ?? 'a coefficient'}: its term is zero for all.`,
      remedy: `Fix ${last === undefined ? 'one of them' : `the ${coefficientWords[last]}`} or give it a prior, or observe standards of other colours, at other altitudes or times.`,
    };
  });
}

const spelt = (range: Range | null): string =>
  range === null ? 'none known' : `${figure(range.min, 2)} to ${figure(range.max, 2)}`;
