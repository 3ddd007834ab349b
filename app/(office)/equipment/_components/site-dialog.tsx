'use client';

import { bands } from '@/lib/contracts/bands';
import type { MeanExtinction } from '@/lib/contracts/equipment';
import { saveSiteAction } from '../actions';
import { BandPairs } from './band-pairs';
import { EditDialog } from './edit-dialog';
import { TextFields } from './text-fields';

export interface SiteValues {
  readonly name: string;
  readonly longitude: number;
  readonly latitude: number;
  readonly elevation: number;
  readonly timezone: string;
  readonly meanExtinction: MeanExtinction;
}

const plain = ['name', 'longitude', 'latitude', 'elevation', 'timezone', 'extinctionSource'];
const paired = bands.flatMap((band) => [`mean${band}`, `sigma${band}`]);

export function SiteDialog({ site }: { readonly site: SiteValues | null }) {
  const extinction = site?.meanExtinction ?? {};
  const source = Object.values(extinction).find((one) => one !== undefined)?.source ?? '';
  return (
    <EditDialog
      action={saveSiteAction}
      title={site === null ? 'Add a site' : site.name}
      button={site === null ? 'Add a site' : 'Change'}
      buttonLabel={site === null ? 'Add a site' : `Change ${site.name}`}
      hidden={{ site: site?.name ?? '' }}
      fields={[...plain, ...paired]}
    >
      {(state) => (
        <>
          <TextFields
            state={state}
            fields={[
              { name: 'name', label: 'Name', value: site?.name ?? '' },
              { name: 'longitude', label: 'Longitude, deg, east positive', value: site?.longitude ?? 0 },
              { name: 'latitude', label: 'Latitude, deg, north positive', value: site?.latitude ?? 0 },
              { name: 'elevation', label: 'Elevation, m', value: site?.elevation ?? 0 },
              {
                name: 'timezone',
                label: 'Time zone',
                value: site?.timezone ?? 'UTC',
                hint: 'As Atlantic/Canary',
              },
            ]}
          />
          <BandPairs
            state={state}
            legend="Mean extinction, mag per airmass; a solve may take it as a prior"
            names={['mean', 'sigma']}
            values={Object.fromEntries(
              Object.entries(extinction).flatMap(([band, one]) =>
                one === undefined ? [] : [[band, [one.mean, one.sigma] as const]],
              ),
            )}
          />
          <TextFields
            state={state}
            fields={[
              {
                name: 'extinctionSource',
                label: 'Where the extinction comes from',
                value: source,
                optional: true,
              },
            ]}
          />
        </>
      )}
    </EditDialog>
  );
}
