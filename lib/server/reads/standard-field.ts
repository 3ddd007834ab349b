import 'server-only';
import { tangentOffset } from '@/lib/astro/tangent-plane';
import { fieldSlug } from '@/lib/contracts/field-slug';
import {
  standardFieldNames,
  standards,
  standardSources,
  type StandardRow,
  type StandardSourceRow,
} from '@/lib/server/data/standards';
import type { Caller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { summary, type FieldsQuery, type StandardField } from './standard-fields';
import { telescopeChoices, tonightSky, type TonightSky } from './tonight-sky';

/** A star of a field with its place on the chart [deg from the middle, east and north positive]. */
export type ChartedStar = Omit<StandardRow, 'id' | 'nameKey' | 'field'> & {
  readonly east: number;
  readonly north: number;
};

export interface StandardFieldPage {
  readonly field: StandardField;
  /** By right ascension. */
  readonly stars: readonly ChartedStar[];
  readonly sources: readonly StandardSourceRow[];
  readonly telescope: TonightSky['telescope'] | null;
  readonly night: TonightSky['night'];
}

/** One standard field with all its stars; null when there is none of that address. */
export async function standardField(
  caller: Caller,
  slug: string,
  query: FieldsQuery,
): Promise<StandardFieldPage | null> {
  demand(caller, 'standards.see');
  const name = (await standardFieldNames()).find((field) => fieldSlug(field) === slug);
  if (name === undefined) return null;
  const [stars, sources, choices] = await Promise.all([
    standards({ field: name }),
    standardSources(),
    telescopeChoices(),
  ]);
  const chosen = choices.find(({ code }) => code === query.telescope) ?? choices[0];
  const sky = chosen ? await tonightSky(chosen.code, query.now) : null;
  const field = summary(name, stars, sky);
  const named = new Set(stars.map(({ source }) => source));
  return {
    field,
    stars: stars.map(({ id: _id, nameKey: _key, field: _field, ...star }) => ({
      ...star,
      ...tangentOffset(field, star),
    })),
    sources: sources.filter(({ citation }) => named.has(citation)),
    telescope: sky?.telescope ?? null,
    night: sky?.night ?? null,
  };
}
