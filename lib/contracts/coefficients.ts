import type { CoefficientName } from '@/lib/photometry/fit-model';

/** Names of the coefficients in the interface, and as the science code calls them. */
export const coefficientNames = [
  'zero_point',
  'extinction',
  'colour_term',
  'second_order_extinction',
  'drift',
  'extinction_drift',
  'colour_term_2',
] as const;
export type ApiCoefficient = (typeof coefficientNames)[number];

const scienceNames = {
  zero_point: 'zeroPoint',
  extinction: 'extinction',
  colour_term: 'colourTerm',
  second_order_extinction: 'secondOrderExtinction',
  drift: 'drift',
  extinction_drift: 'extinctionDrift',
  colour_term_2: 'colourTerm2',
} as const satisfies Record<ApiCoefficient, CoefficientName>;

const apiNames = Object.fromEntries(
  Object.entries(scienceNames).map(([api, science]) => [science, api]),
) as Readonly<Record<CoefficientName, ApiCoefficient>>;

export const toScienceName = (name: ApiCoefficient): CoefficientName => scienceNames[name];
export const toApiName = (name: CoefficientName): ApiCoefficient => apiNames[name];

/** The coefficients in words and units, as pages and mails show them. */
export const coefficientWords = {
  zero_point: { title: 'Zero point', unit: 'mag, at airmass 0 and colour 0' },
  extinction: { title: 'Extinction', unit: 'mag per airmass' },
  colour_term: { title: 'Colour term', unit: 'mag per mag' },
  second_order_extinction: { title: 'Second-order extinction', unit: 'mag per airmass and mag' },
  drift: { title: 'Drift', unit: 'mag per hour' },
  extinction_drift: { title: 'Drift of extinction', unit: 'mag per airmass and hour' },
  colour_term_2: { title: 'Quadratic colour term', unit: 'mag per mag²' },
} as const satisfies Record<ApiCoefficient, { readonly title: string; readonly unit: string }>;
