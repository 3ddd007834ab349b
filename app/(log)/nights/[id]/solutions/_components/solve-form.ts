import { bands, type Band } from '@/lib/contracts/bands';
import {
  coefficientNames,
  coefficientWords,
  toScienceName,
  type ApiCoefficient,
} from '@/lib/contracts/coefficients';
import type { SolveOptions } from '@/lib/contracts/solve-options';
import { usualBandModel } from '@/lib/photometry/fit-model';

/** How a coefficient enters, and the figures as they were typed. */
export interface TermLine {
  readonly mode: 'free' | 'prior' | 'fixed' | 'none';
  readonly value: string;
  readonly error: string;
}
export type BandTerms = Readonly<Record<ApiCoefficient, TermLine>>;

export interface SolveForm {
  readonly bands: readonly Band[];
  readonly terms: Readonly<Record<Band, BandTerms>>;
  readonly airmass_formula: SolveOptions['airmass_formula'];
  readonly nights: readonly string[];
  /** Decisions on observations that an earlier solution had. */
  readonly exclusions: SolveOptions['exclusions'];
}

/** `V second_order_extinction`: where a fault is shown. */
export type FaultPlace = `${Band} ${ApiCoefficient}` | 'bands';
export type SolveFaults = Readonly<Partial<Record<FaultPlace, string>>>;

/** The usual model's term, as it would be typed. */
export function usualTerm(band: Band, name: ApiCoefficient): TermLine {
  const term = usualBandModel(band).terms[toScienceName(name)];
  if (term === undefined) return { mode: 'none', value: '', error: '' };
  if (term.status === 'free') return { mode: 'free', value: '', error: '' };
  const value = String(term.value);
  return term.status === 'fixed'
    ? { mode: 'fixed', value, error: '' }
    : { mode: 'prior', value, error: String(term.error) };
}

function termOf(band: Band, name: ApiCoefficient, options: SolveOptions | null): TermLine {
  const prior = options?.priors[band]?.[name];
  if (prior !== undefined) return { mode: 'prior', value: String(prior.value), error: String(prior.error) };
  const term = options?.terms[band]?.[name];
  if (term === undefined) return usualTerm(band, name);
  return typeof term === 'string'
    ? { mode: term, value: '', error: '' }
    : { mode: 'fixed', value: String(term.fixed), error: '' };
}

/** The form as it stands before anybody types: the usual model, or an earlier solution's. */
export function solveForm(available: readonly Band[], options: SolveOptions | null = null): SolveForm {
  const terms = (band: Band) =>
    Object.fromEntries(coefficientNames.map((name) => [name, termOf(band, name, options)]));
  return {
    bands: options?.bands?.filter((band) => available.includes(band)) ?? available,
    terms: Object.fromEntries(bands.map((band) => [band, terms(band)])) as Record<Band, BandTerms>,
    airmass_formula: options?.airmass_formula ?? 'young1994',
    nights: options?.nights ?? [],
    exclusions: options?.exclusions ?? [],
  };
}

/** A figure as people type it, with a true minus sign too. */
function figure(text: string): number | null {
  const value = Number(text.trim().replace('−', '-'));
  return text.trim() !== '' && Number.isFinite(value) && Math.abs(value) <= 100 ? value : null;
}

const same = (one: TermLine, other: TermLine): boolean =>
  one.mode === other.mode &&
  (one.mode === 'free' ||
    one.mode === 'none' ||
    (figure(one.value) === figure(other.value) &&
      (one.mode === 'fixed' || figure(one.error) === figure(other.error))));

type Read =
  | { readonly ok: true; readonly options: Partial<SolveOptions> }
  | { readonly ok: false; readonly faults: SolveFaults };

function faultOf({ mode, value, error }: TermLine): string | null {
  if (mode !== 'fixed' && mode !== 'prior') return null;
  if (figure(value) === null) return 'Write a value from −100 to 100, such as −0.03.';
  if (mode === 'fixed') return null;
  const size = figure(error);
  return size === null || size <= 0 ? 'Write an error above 0, such as 0.01.' : null;
}

/** What the form asks for: only what differs from the usual model is said. */
export function readSolveForm(form: SolveForm, available: readonly Band[]): Read {
  const faults: Partial<Record<FaultPlace, string>> = {};
  const terms: SolveOptions['terms'] = {};
  const priors: SolveOptions['priors'] = {};
  if (form.bands.length === 0) faults.bands = 'Choose a band.';
  for (const band of form.bands) {
    for (const name of coefficientNames) {
      const line = form.terms[band][name];
      const fault = faultOf(line);
      if (fault !== null) faults[`${band} ${name}`] = fault;
      if (fault !== null || same(line, usualTerm(band, name))) continue;
      const [value, error] = [figure(line.value) ?? 0, figure(line.error) ?? 0];
      if (line.mode === 'prior') priors[band] = { ...priors[band], [name]: { value, error } };
      else {
        terms[band] = { ...terms[band], [name]: line.mode === 'fixed' ? { fixed: value } : line.mode };
      }
    }
  }
  if (Object.keys(faults).length > 0) return { ok: false, faults };
  const isAll = form.bands.length === available.length;
  return {
    ok: true,
    options: {
      ...(isAll ? {} : { bands: bands.filter((band) => form.bands.includes(band)) }),
      terms,
      priors,
      airmass_formula: form.airmass_formula,
      nights: [...form.nights],
      exclusions: form.exclusions,
    },
  };
}

/** The usual model in a sentence, for the bands at hand. */
export function usualWords(available: readonly Band[]): string {
  const priors = available.flatMap((band) => {
    const { mode, value, error } = usualTerm(band, 'second_order_extinction');
    return mode === 'prior' ? [`${value.replace('-', '−')} ± ${error} known beforehand in ${band}`] : [];
  });
  const second = coefficientWords.second_order_extinction.title.toLowerCase();
  return `Zero point, extinction and colour term free in every band; ${second} ${
    priors.length === 0 ? 'zero' : `${priors.join(', ')}, zero elsewhere`
  }; no drift; airmass after Young 1994.`;
}
