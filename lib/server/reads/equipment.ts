import 'server-only';
import { ColourTerms, MeanExtinction } from '@/lib/contracts/equipment';
import {
  camerasOf,
  epochsOf,
  filtersOf,
  sites,
  telescopes,
  type CameraRow,
  type EpochRow,
  type FilterRow,
  type SiteRow,
  type TelescopeRow,
} from '@/lib/server/data/equipment';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand, may } from '@/lib/server/policy/matrix';

export interface SiteShown extends Omit<SiteRow, 'meanExtinction'> {
  readonly meanExtinction: MeanExtinction;
}
export interface EpochShown extends Omit<EpochRow, 'colourTerms'> {
  readonly colourTerms: ColourTerms;
  readonly camera: string;
}
export interface TelescopeShown extends TelescopeRow {
  readonly site: string;
  readonly cameras: readonly CameraRow[];
  readonly filters: readonly FilterRow[];
  readonly epochs: readonly EpochShown[];
}

export interface Equipment {
  readonly sites: readonly SiteShown[];
  readonly telescopes: readonly TelescopeShown[];
  readonly mayManage: boolean;
  readonly mayManageSite: boolean;
}

/** Sites and telescopes with what hangs on them. */
export async function equipment(caller: PersonCaller): Promise<Equipment> {
  demand(caller, 'equipment.see');
  const [places, rows] = await Promise.all([sites(), telescopes()]);
  const filters = await filtersOf(rows.map(({ id }) => id));
  return {
    sites: places.map((site) => ({ ...site, meanExtinction: MeanExtinction.parse(site.meanExtinction) })),
    telescopes: await Promise.all(
      rows.map(async (row) => {
        const [cameras, epochs] = await Promise.all([camerasOf(row.id), epochsOf(row.id)]);
        return {
          ...row,
          site: places.find(({ id }) => id === row.siteId)?.name ?? '',
          cameras,
          filters: filters.filter(({ telescopeId }) => telescopeId === row.id),
          epochs: epochs.map((epoch) => ({
            ...epoch,
            colourTerms: ColourTerms.parse(epoch.colourTerms),
            camera: cameras.find(({ id }) => id === epoch.cameraId)?.name ?? '',
          })),
        };
      }),
    ),
    mayManage: may(caller, 'equipment.manage'),
    mayManageSite: may(caller, 'site.manage'),
  };
}
