import type { CalibratedSort, MeasuredQuantities, NumberedStar } from '@/lib/contracts/calibrated-page';
import { bands } from '@/lib/contracts/bands';

type Quantity = 'V' | 'BV' | 'B' | 'UB' | 'VR' | 'VI';

export interface QuantityColumn {
  readonly name: Quantity;
  readonly label: string;
  readonly meaning: string;
}

const quantityColumns: readonly QuantityColumn[] = [
  { name: 'V', label: 'V', meaning: 'Magnitude in V on the standard system, mean of the night' },
  { name: 'BV', label: 'B−V', meaning: 'Colour index on the standard system' },
  { name: 'B', label: 'B', meaning: 'Magnitude in B on the standard system, from V and B−V' },
  { name: 'UB', label: 'U−B', meaning: 'Colour index on the standard system' },
  { name: 'VR', label: 'V−R', meaning: 'Colour index on the standard system' },
  { name: 'VI', label: 'V−I', meaning: 'Colour index on the standard system' },
];

/** Quantities that the result has, V and B−V always. */
export const quantitiesOf = (has: MeasuredQuantities): readonly QuantityColumn[] =>
  quantityColumns.filter(({ name }) => name === 'V' || name === 'BV' || has[name]);

export interface ErrorBudget {
  readonly value: number | null;
  readonly random: number | null;
  readonly systematic: number | null;
  readonly total: number | null;
}

/** A quantity of a star with its error and the two parts of it. */
export const budgetOf = (star: NumberedStar, name: Quantity): ErrorBudget => ({
  value: star[name],
  random: star[`${name}_random`],
  systematic: star[`${name}_systematic`],
  total: star[`${name}_total`],
});

/** How many measurements were used: `3 B, 4 V`. */
export const countWords = (star: NumberedStar): string =>
  bands
    .map((band) => ({ band, n: star[`n_${band}`] }))
    .filter(({ n }) => n > 0)
    .map(({ band, n }) => `${n} ${band}`)
    .join(', ');

/** What stands under the table for who asks what a column means. */
export const meanings = (
  quantities: readonly QuantityColumn[],
): readonly { readonly term: string; readonly meaning: string }[] => [
  { term: 'Star', meaning: 'Its name in the uploaded table' },
  ...quantities.map(({ label, meaning }) => ({ term: `${label}, mag`, meaning: `${meaning}.` })),
  {
    term: '±',
    meaning:
      'Standard error, total: the root of the sum of squares of its random and its systematic part. The random part falls as measurements are averaged; the systematic part comes from the coefficients and is common to the night.',
  },
  {
    term: 'Cautions',
    meaning: 'What to think of before the figure is used; every download carries them too.',
  },
  { term: 'Measurements', meaning: 'How many were used in each band' },
  { term: 'Airmass', meaning: 'Mean of the measurements used' },
  { term: 'Right ascension, declination', meaning: 'J2000, from the uploaded table' },
  { term: 'BJD', meaning: 'Mean mid-exposure as barycentric Julian date, TDB, days' },
];

/** What the columns are sorted by; a further press turns the order round. */
export const sortWords: Readonly<Record<CalibratedSort, string>> = {
  star: 'name',
  ra: 'right ascension',
  V: 'V',
  V_total: 'error of V',
  BV: 'B−V',
  BV_total: 'error of B−V',
  B: 'B',
  UB: 'U−B',
  VR: 'V−R',
  VI: 'V−I',
  n_V: 'measurements in V',
  airmass: 'airmass',
};
