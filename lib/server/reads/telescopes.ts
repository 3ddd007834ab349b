import 'server-only';
import type { Telescope } from '@/lib/contracts/api/telescope';
import type { Page } from '@/lib/contracts/common';
import { fromCursor, pageOf } from '@/lib/server/data/cursor';
import { filtersOf, sites, telescopes } from '@/lib/server/data/equipment';
import type { Caller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** A page of the telescopes that are in use, in the form of the HTTP interface. */
export async function readTelescopes(
  caller: Caller,
  { after, limit }: Page,
): Promise<{ items: Telescope[]; next: string | null }> {
  demand(caller, 'equipment.see');
  const last = fromCursor(after, ['string']);
  const found = await telescopes({
    after: last === null ? undefined : String(last[0]),
    limit: limit + 1,
    inUse: true,
  });
  const { rows, next } = pageOf(found, limit, ({ code }) => [code]);
  const [places, filters] = await Promise.all([sites(), filtersOf(rows.map(({ id }) => id))]);
  return {
    items: rows.flatMap((row) => {
      const site = places.find(({ id }) => id === row.siteId);
      if (!site) return [];
      const { name, longitude, latitude, elevation, timezone } = site;
      return [
        {
          code: row.code,
          name: row.name,
          site: { name, longitude, latitude, elevation, timezone },
          bands: filters.filter(({ telescopeId }) => telescopeId === row.id).map(({ band }) => band),
        },
      ];
    }),
    next,
  };
}
