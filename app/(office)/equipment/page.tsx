import type { Metadata } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Figure } from '@/app/_components/ui/figure';
import { formatPlain } from '@/lib/contracts/format-figure';
import { KeyValues } from '@/app/_components/ui/key-values';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { bands } from '@/lib/contracts/bands';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { equipment, type SiteShown } from '@/lib/server/reads/equipment';
import { SiteDialog, type SiteValues } from './_components/site-dialog';
import { TelescopeDialog } from './_components/telescope-dialogs';
import { TelescopePanel, type TelescopeOnPage } from './_components/telescope-panel';

export const metadata: Metadata = { title: 'Equipment' };

/** What the browser gets of a site: no internal ids. */
const siteValues = ({
  name,
  longitude,
  latitude,
  elevation,
  timezone,
  meanExtinction,
}: SiteShown): SiteValues => ({
  name,
  longitude,
  latitude,
  elevation,
  timezone,
  meanExtinction,
});

type Shown = Awaited<ReturnType<typeof equipment>>['telescopes'][number];
const telescopeOnPage = (shown: Shown): TelescopeOnPage => ({
  code: shown.code,
  name: shown.name,
  site: shown.site,
  aperture_m: shown.aperture_m,
  minAltitude: shown.minAltitude,
  retiredOn: shown.retiredOn,
  cameras: shown.cameras.map(({ id: _id, telescopeId: _telescope, ...camera }) => camera),
  filters: shown.filters.map(({ band, name, defaultExposure }) => ({ band, name, defaultExposure })),
  epochs: shown.epochs.map(({ startsOn, endsOn, camera, description, colourTerms }) => ({
    startsOn,
    endsOn,
    camera,
    description,
    colourTerms,
  })),
});

export default async function EquipmentPage() {
  const caller = await callerOrSignIn();
  const { sites, telescopes, mayManage, mayManageSite } = await equipment(caller);
  const siteNames = sites.map(({ name }) => name);
  return (
    <>
      <PageHead
        title="Equipment"
        actions={
          <>
            {mayManageSite ? <SiteDialog site={null} /> : null}
            {mayManage && siteNames.length > 0 ? (
              <TelescopeDialog telescope={null} sites={siteNames} />
            ) : null}
          </>
        }
      />
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(320px,24%)]">
        <div className="grid gap-8">
          {telescopes.length === 0 ? (
            <Panel>
              <EmptyState title="No telescopes yet">
                A night belongs to a telescope. Add the site first, then the telescope with camera and
                filters.
              </EmptyState>
            </Panel>
          ) : (
            telescopes.map((one) => (
              <TelescopePanel
                key={one.code}
                telescope={telescopeOnPage(one)}
                sites={siteNames}
                mayManage={mayManage}
              />
            ))
          )}
        </div>
        <div className="grid gap-5">
          {sites.map((site) => (
            <SitePanel key={site.name} site={siteValues(site)} mayManage={mayManageSite} />
          ))}
        </div>
      </div>
    </>
  );
}

function SitePanel({ site, mayManage }: { readonly site: SiteValues; readonly mayManage: boolean }) {
  const extinction = bands.flatMap((band) => {
    const one = site.meanExtinction[band];
    return one === undefined ? [] : [{ band, ...one }];
  });
  return (
    <Panel title={site.name} note="site" actions={mayManage ? <SiteDialog site={site} /> : undefined}>
      <KeyValues
        items={[
          { key: 'Longitude, east', value: `${formatPlain(site.longitude)}°`, figure: true },
          { key: 'Latitude, north', value: `${formatPlain(site.latitude)}°`, figure: true },
          { key: 'Elevation', value: `${formatPlain(site.elevation)} m`, figure: true },
          { key: 'Time zone', value: site.timezone },
          ...extinction.map(({ band, mean, sigma }) => ({
            key: `Mean extinction in ${band}`,
            value: <Figure value={mean} error={sigma} />,
          })),
        ]}
      />
      {extinction.length === 0 ? (
        <p className="mt-2 text-small text-ink-2">No mean extinction yet; a solve cannot fall back on it.</p>
      ) : (
        <p className="mt-2 text-small text-ink-2">Extinction in mag per airmass: {extinction[0]?.source}</p>
      )}
    </Panel>
  );
}
