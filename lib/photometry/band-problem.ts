/**
 * The rows of one band, as the fit needs them. What a fixed term contributes has been taken off the observations, so
 * that y = X β + star + frame + e holds for the terms that are sought:
 *
 *     y = m_inst − M − fixed terms
 *
 * | symbol | name | shape | what it is |
 * |---|---|---|---|
 * | y | response | (n) | as above [mag] |
 * | X | column | (n) per coefficient | 1, X, C, X·C, t, t·X, C² in coefficientOrder; only those free or with a prior |
 * | σ_i | sigma | (n) | error of the measurement [mag] |
 * | τ_s | starSigma | (stars) | published error of the star's magnitude in this band [mag] |
 *
 * Rows stand in an order that their values alone give (night, time, airmass, magnitude): a solution does not depend on
 * the order in which observations arrive.
 */
import { bandPlace, colourForBand, magnitudeInBand, type BandName, type StarColours } from './bands';
import { coefficientOrder, type BandModel, type CoefficientName, type Term } from './fit-model';
import { type StandardObservations } from './standard-observations';

export type SoughtTerm = Exclude<Term, { readonly status: 'fixed' }>;

export interface BandProblem {
  readonly band: BandName;
  readonly model: BandModel;
  /** Coefficients that are sought, in coefficientOrder; one column each. */
  readonly sought: readonly { readonly name: CoefficientName; readonly term: SoughtTerm }[];
  readonly nights: number;
  /** Place of each row among the observations; shapes (n). */
  readonly observation: Int32Array;
  readonly night: Int32Array;
  /** Places in the lists of stars and frames of the observations. */
  readonly star: Int32Array;
  readonly frame: Int32Array;
  readonly airmass: Float64Array;
  readonly colour: Float64Array;
  readonly hours: Float64Array;
  readonly response: Float64Array;
  readonly sigma: Float64Array;
  /** Values of `overrules`. */
  readonly overrule: Uint8Array;
  /** Error of each star in the list of stars. */
  readonly starSigma: Float64Array;
}

/** An observation that cannot enter any fit of its band, and why. */
export interface MissingRow {
  readonly observation: number;
  readonly reason: 'no-colour' | 'not-fitted';
  readonly words: string;
}

/** Published error of a star's magnitude in a band: that of V and of the colours it is made from, taken as independent.
 * @param errors - standard errors as published, shape (n stars) each [mag]
 * @param star - which star [1]
 * @param band - of the standard system
 * @returns standard error; NaN where one it needs is unknown: what to take then is for the caller to decide [mag]
 * @accuracy exact for independent errors
 * @source propagation of errors */
export function starErrorInBand(errors: StarColours, star: number, band: BandName): number {
  const v = errors.V[star]!;
  switch (band) {
    case 'U':
      return Math.hypot(v, errors.BV[star]!, errors.UB[star]!);
    case 'B':
      return Math.hypot(v, errors.BV[star]!);
    case 'V':
      return v;
    case 'R':
      return Math.hypot(v, errors.VR[star]!);
    case 'I':
      return Math.hypot(v, errors.VI[star]!);
  }
}

/** Value of a coefficient's column for an observation: the derivative of the transformation.
 * @param name - of the coefficient
 * @param airmass - X [1]
 * @param colour - C [mag]
 * @param hours - t [h]
 * @returns 1, X, C, X·C, t, t·X or C² [unit of the magnitude over that of the coefficient]
 * @source the equation in transformation-model.ts */
export function columnValue(name: CoefficientName, airmass: number, colour: number, hours: number): number {
  switch (name) {
    case 'zeroPoint':
      return 1;
    case 'extinction':
      return airmass;
    case 'colourTerm':
      return colour;
    case 'secondOrderExtinction':
      return airmass * colour;
    case 'drift':
      return hours;
    case 'extinctionDrift':
      return hours * airmass;
    case 'colourTerm2':
      return colour * colour;
  }
}

/** Coefficients that say how the outcome depends on colour. */
export const colourCoefficients: readonly CoefficientName[] = [
  'colourTerm',
  'secondOrderExtinction',
  'colourTerm2',
];

/** Coefficients that each night has of its own and that only frames can determine; the others are shared by nights. */
export const nightCoefficients: readonly CoefficientName[] = [
  'zeroPoint',
  'extinction',
  'drift',
  'extinctionDrift',
];
const isSought = (term: Term): term is SoughtTerm => term.status !== 'fixed';

/** Rows of one band, and the observations that cannot be among them.
 * @param observations - all observations
 * @param model - of the band
 * @returns rows in their own order, and what is missing
 * @source definition of the model: photometric transformation of transformation-model.ts */
export function bandProblem(
  observations: StandardObservations,
  model: BandModel,
): { readonly problem: BandProblem; readonly missing: readonly MissingRow[] } {
  const place = bandPlace[model.band];
  const { standards, standardErrors } = observations;
  const terms = coefficientOrder.flatMap((name) => {
    const term = model.terms[name];
    return term === undefined ? [] : [{ name, term }];
  });
  const sought = terms.flatMap(({ name, term }) => (isSought(term) ? [{ name, term }] : []));
  const fixed = terms.flatMap(({ name, term }) =>
    term.status === 'fixed' && term.value !== 0 ? [{ name, value: term.value }] : [],
  );
  const needsColour = [...sought, ...fixed].some(({ name }) => colourCoefficients.includes(name));
  const stars = standards.V.length;
  const starSigma = Float64Array.from({ length: stars }, (_, s) =>
    starErrorInBand(standardErrors, s, model.band),
  );
  const missing: MissingRow[] = [];
  const rows: number[] = [];
  for (let o = 0; o < observations.band.length; o += 1) {
    if (observations.band[o] !== place) continue;
    const fault = faultOf(observations, o, { place, needsColour, starSigma });
    if (fault === null) rows.push(o);
    else missing.push({ observation: o, ...fault });
  }
  const { night, hours, airmass, instMag, frame, star } = observations;
  rows.sort(
    (a, b) =>
      night[a]! - night[b]! ||
      hours[a]! - hours[b]! ||
      airmass[a]! - airmass[b]! ||
      instMag[a]! - instMag[b]! ||
      a - b,
  );
  const floats = (value: (o: number) => number): Float64Array => Float64Array.from(rows, value);
  const places = (value: (o: number) => number): Int32Array => Int32Array.from(rows, value);
  // Without a term in colour an unknown colour does no harm.
  const colourOf = (o: number): number => colourForBand(standards, star[o]!, place);
  const response = floats((o) => {
    let y = instMag[o]! - magnitudeInBand(standards, star[o]!, place);
    for (const { name, value } of fixed) y -= value * columnValue(name, airmass[o]!, colourOf(o), hours[o]!);
    return y;
  });
  return {
    problem: {
      band: model.band,
      model,
      sought,
      nights: observations.nightNames.length,
      observation: Int32Array.from(rows),
      night: places((o) => night[o]!),
      star: places((o) => star[o]!),
      frame: places((o) => frame[o]!),
      airmass: floats((o) => airmass[o]!),
      colour: floats(colourOf),
      hours: floats((o) => hours[o]!),
      response,
      sigma: floats((o) => observations.instErr[o]!),
      overrule: Uint8Array.from(rows, (o) => observations.overrule[o]!),
      starSigma,
    },
    missing,
  };
}

interface Needs {
  readonly place: number;
  readonly needsColour: boolean;
  readonly starSigma: Float64Array;
}

function faultOf(
  { standards, star, instMag, instErr, airmass, hours }: StandardObservations,
  o: number,
  { place, needsColour, starSigma }: Needs,
): Pick<MissingRow, 'reason' | 'words'> | null {
  const s = star[o]!;
  if (needsColour && !Number.isFinite(colourForBand(standards, s, place))) {
    return { reason: 'no-colour', words: 'The star has no published colour for this band.' };
  }
  const notFitted = (words: string): Pick<MissingRow, 'reason' | 'words'> => ({
    reason: 'not-fitted',
    words,
  });
  if (!Number.isFinite(magnitudeInBand(standards, s, place))) {
    return notFitted('The star has no published magnitude in this band.');
  }
  if (!Number.isFinite(starSigma[s]!)) return notFitted('The error of the star’s magnitude is not known.');
  if (!Number.isFinite(instMag[o]!)) return notFitted('The instrumental magnitude is not a number.');
  if (!(instErr[o]! >= 0 && instErr[o]! < Infinity)) return notFitted('The error is not a number ≥ 0.');
  if (!Number.isFinite(airmass[o]!)) return notFitted('The airmass is not known.');
  if (!Number.isFinite(hours[o]!)) return notFitted('The time is not known.');
  return null;
}

/** Rows of one night: they stand together, as rows are sorted by night first.
 * @param problem - of the band
 * @param place - of the night [1]
 * @returns numbers of its rows, ascending [1]
 * @source definition */
export function rowsOfNight(problem: BandProblem, place: number): Int32Array {
  const { night } = problem;
  const first = night.indexOf(place);
  if (first < 0) return new Int32Array(0);
  return Int32Array.from({ length: night.lastIndexOf(place) + 1 - first }, (_, k) => first + k);
}

/** Design of some rows of a band, one column for each coefficient that is sought.
 * @param problem - of the band
 * @param rows - numbers of rows, shape (m) [1]
 * @returns design, column-major, shape (m, p) [unit of the magnitude over that of the coefficient]
 * @source definition */
export function designOf(problem: BandProblem, rows: Int32Array): Float64Array {
  const { sought, airmass, colour, hours } = problem;
  const design = new Float64Array(rows.length * sought.length);
  for (const [j, { name }] of sought.entries()) {
    for (let i = 0; i < rows.length; i += 1) {
      const row = rows[i]!;
      design[j * rows.length + i] = columnValue(name, airmass[row]!, colour[row]!, hours[row]!);
    }
  }
  return design;
}
