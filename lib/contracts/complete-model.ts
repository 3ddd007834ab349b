import type { Issue } from '@/lib/faults/fault';
import {
  usualBandModel,
  usualLimits,
  type BandModel,
  type CoefficientName,
  type FitModel,
  type Term,
} from '@/lib/photometry/fit-model';
import { bands as allBands, type Band } from './bands';
import { toScienceName, type ApiCoefficient } from './coefficients';
import type { SolveOptions } from './solve-options';

/** One for all: whoever solves the same observations again gets the same numbers. */
const seed = 1;

interface CompletedModel {
  readonly model: FitModel;
  /** Everything in the options that makes no sense. */
  readonly issues: readonly Issue[];
}

type Choices = Pick<SolveOptions, 'bands' | 'terms' | 'priors'>;

/** The model that the options ask for, with everything written out that they leave to custom. */
export function completeModel(options: Choices, bandsWithStandards: readonly Band[]): CompletedModel {
  const bands = options.bands ?? bandsWithStandards;
  const issues: Issue[] = bands.flatMap((band, place) =>
    bandsWithStandards.includes(band)
      ? []
      : [
          {
            path: `bands.${place}`,
            value: band,
            message: 'the night has no matched standards in this band',
            remedy: 'Leave it out, or upload measurements of standards in it.',
          },
        ],
  );
  for (const part of ['terms', 'priors'] as const) {
    for (const band of keysOf(options[part])) {
      if (bands.includes(band)) continue;
      issues.push({ path: `${part}.${band}`, value: band, message: 'is for a band that is not solved' });
    }
  }
  const models = allBands
    .filter((band) => bands.includes(band))
    .map((band) => bandModel(band, options, issues));
  return { model: { bands: models, limits: usualLimits, seed }, issues };
}

const keysOf = <Key extends string>(record: Readonly<Partial<Record<Key, unknown>>>): readonly Key[] =>
  Object.keys(record) as Key[];

function bandModel(band: Band, options: Choices, issues: Issue[]): BandModel {
  const terms: Partial<Record<CoefficientName, Term>> = { ...usualBandModel(band).terms };
  const choices = options.terms[band] ?? {};
  const priors = options.priors[band] ?? {};
  for (const name of keysOf<ApiCoefficient>(choices)) {
    const choice = choices[name];
    if (choice === undefined) continue;
    if (choice === 'none') {
      if (name === 'zero_point') {
        issues.push({
          path: `terms.${band}.zero_point`,
          value: 'none',
          message: 'a band cannot be solved without its zero point',
        });
      }
      delete terms[toScienceName(name)];
    } else {
      terms[toScienceName(name)] =
        choice === 'free' ? { status: 'free' } : { status: 'fixed', value: choice.fixed };
    }
  }
  for (const name of keysOf<ApiCoefficient>(priors)) {
    const prior = priors[name];
    if (prior === undefined) continue;
    const choice = choices[name];
    if (choice !== undefined && choice !== 'free') {
      issues.push({
        path: `priors.${band}.${name}`,
        message: `the same coefficient is ${choice === 'none' ? 'left out of the model' : 'held at a value'}`,
        remedy: 'Give a prior or a term, not both.',
      });
    }
    terms[toScienceName(name)] = { status: 'prior', value: prior.value, error: prior.error };
  }
  return { band, terms };
}
