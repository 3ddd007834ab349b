import 'server-only';
import { nightOf } from '@/lib/astro/night-bounds';
import type { Night } from '@/lib/contracts/api/night';
import type { Telescope } from '@/lib/contracts/api/telescope';
import { listNightRows, toNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';
import { readTelescopes } from './telescopes';

export interface TonightAt {
  readonly telescope: Telescope;
  /** Local evening date of the night that now belongs to. */
  readonly date: string;
  /** Null while nobody has opened it, or where the caller may not see it. */
  readonly night: Night | null;
}

export interface Tonight {
  readonly telescopes: readonly TonightAt[];
  /** Nights of earlier dates that nobody has closed, the latest first. */
  readonly leftOpen: readonly Night[];
  readonly mayOpen: boolean;
}

/** More telescopes, or nights left open, than this are no page but a list. */
const most = 100;

/** The night that is now, or comes next, at each telescope in use. */
export async function tonight(caller: Caller, now: number): Promise<Tonight> {
  const { items } = await readTelescopes(caller, { limit: most });
  const scope = nightScope(caller);
  const dates = items.map((telescope) => ({ telescope, date: nightOf(now, telescope.site.timezone) }));
  const [opened, nights] = await Promise.all([
    listNightRows(scope, { state: 'open', limit: most }),
    Promise.all(
      dates.map(({ telescope, date }) =>
        listNightRows(scope, { telescope: telescope.code, from: date, to: date, limit: 1 }),
      ),
    ),
  ]);
  const telescopes = dates.map(({ telescope, date }, i) => {
    const row = nights[i]?.rows[0];
    return { telescope, date, night: row ? toNight(row) : null };
  });
  const shown = new Set(telescopes.flatMap(({ night }) => night?.id ?? []));
  return {
    telescopes,
    leftOpen: opened.rows.map(toNight).filter(({ id }) => !shown.has(id)),
    mayOpen: may(caller, 'night.open'),
  };
}
