import type { SolutionObservation } from '@/lib/contracts/api/solution';
import { bands, type Band } from '@/lib/contracts/bands';

export const shownParts = ['all', 'rejected', 'selected'] as const;
export type ShownPart = (typeof shownParts)[number];

/** Columns that the table can be sorted by, each with what it is sorted by. */
const sortKeys = {
  frame: ({ frame }: SolutionObservation) => frame,
  star: ({ star }: SolutionObservation) => star,
  band: ({ band }: SolutionObservation) => bands.indexOf(band),
  airmass: ({ airmass }: SolutionObservation) => airmass,
  colour: ({ colour }: SolutionObservation) => colour,
  residual: ({ residual }: SolutionObservation) => residual,
  standardised: ({ standardised }: SolutionObservation) => standardised,
  weight: ({ weight }: SolutionObservation) => weight,
  leverage: ({ leverage }: SolutionObservation) => leverage,
  reason: ({ used, reason }: SolutionObservation) => `${used ? 1 : 0}${reason}`,
} as const satisfies Record<string, (observation: SolutionObservation) => number | string | null>;
export type SortKey = keyof typeof sortKeys;

export interface Sorting {
  readonly key: SortKey;
  readonly descends: boolean;
}

export interface Filter {
  readonly part: ShownPart;
  /** Null for every band. */
  readonly band: Band | null;
  /** Null for every night of a joint solution. */
  readonly night: string | null;
}

export type Selection = ReadonlySet<string>;

const natural = new Intl.Collator('en', { numeric: true });

function compare(a: number | string | null, b: number | string | null): number {
  if (typeof a === 'string' && typeof b === 'string') return natural.compare(a, b);
  return Number(a) - Number(b);
}

/** Sorted by a column; what has no value stands last either way, and equals keep the order of time. */
export function sorted(
  observations: readonly SolutionObservation[],
  sorting: Sorting | null,
): readonly SolutionObservation[] {
  if (sorting === null) return observations;
  const key = sortKeys[sorting.key];
  return observations.toSorted((one, other) => {
    const [a, b] = [key(one), key(other)];
    if (a === null || b === null) return Number(a === null) - Number(b === null);
    return sorting.descends ? compare(b, a) : compare(a, b);
  });
}

/** Those of the chosen band and night: the plots show them all. */
export function plotted(
  observations: readonly SolutionObservation[],
  { band, night }: Pick<Filter, 'band' | 'night'>,
): readonly SolutionObservation[] {
  return observations.filter(
    (one) => (band === null || one.band === band) && (night === null || one.night_date === night),
  );
}

export function listed(
  observations: readonly SolutionObservation[],
  part: ShownPart,
  selection: Selection,
): readonly SolutionObservation[] {
  switch (part) {
    case 'all':
      return observations;
    case 'rejected':
      return observations.filter(({ used }) => !used);
    case 'selected':
      return observations.filter(({ observation }) => selection.has(observation));
  }
}

/** Every observation of the same stars, or of the same frames, as those selected. */
export function widened(
  observations: readonly SolutionObservation[],
  selection: Selection,
  by: 'star' | 'frame',
): Selection {
  const keyOf = (one: SolutionObservation) =>
    by === 'star' ? one.star : `${one.night_date} ${one.frame} ${one.band}`;
  const keys = new Set(
    observations.filter(({ observation }) => selection.has(observation)).map((one) => keyOf(one)),
  );
  return new Set(observations.filter((one) => keys.has(keyOf(one))).map(({ observation }) => observation));
}

/** Added where it was not selected, taken out where it was. */
export function toggled(selection: Selection, observation: string): Selection {
  const next = new Set(selection);
  if (!next.delete(observation)) next.add(observation);
  return next;
}

const few = 3;

function names(noun: string, values: readonly string[]): string {
  const distinct = [...new Set(values)];
  if (distinct.length > few) return `${distinct.length} ${noun}s`;
  return `${noun}${distinct.length === 1 ? '' : 's'} ${distinct.join(', ')}`;
}

/** What is selected, in words: `6 selected: star 114-670, frames 22, 23`. */
export function selectionWords(observations: readonly SolutionObservation[], selection: Selection): string {
  const chosen = observations.filter(({ observation }) => selection.has(observation));
  if (chosen.length === 0) return 'none selected';
  const stars = names(
    'star',
    chosen.map(({ star }) => star),
  );
  const frames = names(
    'frame',
    chosen.map(({ frame }) => String(frame)),
  );
  return `${chosen.length} selected: ${stars}, ${frames}`;
}
