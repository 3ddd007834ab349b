import 'server-only';
import { fieldVisibility, type FieldVisibility } from '@/lib/astro/field-visibility';
import { meanPlace } from '@/lib/astro/tangent-plane';
import { fieldSlug } from '@/lib/contracts/field-slug';
import {
  standards,
  standardSources,
  type StandardRow,
  type StandardSourceRow,
} from '@/lib/server/data/standards';
import type { Caller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { telescopeChoices, tonightSky, type TelescopeChoice, type TonightSky } from './tonight-sky';

/** Smallest and largest of some values. */
export type Span = readonly [number, number];

export interface StandardField {
  readonly name: string;
  /** Last part of its page's address. */
  readonly slug: string;
  readonly nStars: number;
  readonly nUsable: number;
  /** Middle of its stars, deg J2000. */
  readonly ra: number;
  readonly dec: number;
  readonly V: Span;
  readonly BV: Span;
  /** Null when it stays too low, or there is no telescope or no darkness. */
  readonly tonight: FieldVisibility | null;
}

export interface StandardFields {
  readonly fields: readonly StandardField[];
  readonly sources: readonly StandardSourceRow[];
  readonly telescopes: readonly TelescopeChoice[];
  /** For which telescope and hours `tonight` holds. */
  readonly telescope: TonightSky['telescope'] | null;
  readonly night: TonightSky['night'];
}

export interface FieldsQuery {
  /** Code; the first telescope when there is none of that code. */
  readonly telescope?: string | undefined;
  /** ms since 1970 */
  readonly now: number;
}

/** Every standard field in the order of right ascension, with what it is good for tonight. */
export async function standardFields(caller: Caller, query: FieldsQuery): Promise<StandardFields> {
  demand(caller, 'standards.see');
  const [stars, sources, choices] = await Promise.all([standards(), standardSources(), telescopeChoices()]);
  const chosen = choices.find(({ code }) => code === query.telescope) ?? choices[0];
  const sky = chosen ? await tonightSky(chosen.code, query.now) : null;
  const byField = new Map<string, StandardRow[]>();
  for (const star of stars) byField.set(star.field, [...(byField.get(star.field) ?? []), star]);
  return {
    fields: [...byField].map(([name, members]) => summary(name, members, sky)).sort((a, b) => a.ra - b.ra),
    sources,
    telescopes: choices,
    telescope: sky?.telescope ?? null,
    night: sky?.night ?? null,
  };
}

/** One field from its stars, of which there is at least one. */
export function summary(name: string, stars: readonly StandardRow[], sky: TonightSky | null): StandardField {
  const middle = meanPlace(stars);
  return {
    name,
    slug: fieldSlug(name),
    nStars: stars.length,
    nUsable: stars.filter(({ isUsable }) => isUsable).length,
    ...middle,
    V: spanOf(stars.map(({ v }) => v)),
    BV: spanOf(stars.map(({ bv }) => bv)),
    tonight: sky?.track ? fieldVisibility(sky.track, middle, sky.telescope.minAltitude) : null,
  };
}

const spanOf = (values: readonly number[]): Span => [Math.min(...values), Math.max(...values)];
