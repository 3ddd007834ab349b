import type { ReactNode } from 'react';
import { nightSky } from '@/app/_components/charts/night-band/night-sky';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { nightPage } from '@/lib/server/reads/night-page';
import { objectNames } from '@/lib/server/reads/object-names';
import { possibleObservers } from '@/lib/server/reads/possible-observers';
import { fieldsTaken } from '../../_components/fields-taken';
import { NightHead } from './_components/night-head';
import { NightProvider } from './_components/night-provider';
import { NightStrip } from './_components/night-strip';
import { NightTabs } from './_components/night-tabs';

interface NightLayoutProps {
  readonly params: Promise<{ readonly id: string }>;
  readonly children: ReactNode;
}

async function presentTime() {
  return Date.now();
}

/** Everything about one night stands under its head and its band. */
export default async function NightLayout({ params, children }: NightLayoutProps) {
  const [caller, { id }, now] = await Promise.all([callerOrSignIn(), params, presentTime()]);
  const made = await orNotFound(nightPage(caller, id));
  const [objects, observers] = await Promise.all([
    made.may.log ? objectNames(caller, { q: '', limit: 1000 }) : { items: [] },
    possibleObservers(caller),
  ]);
  const sky = nightSky({
    site: made.site,
    date: made.night.date,
    fields: fieldsTaken(made.frames),
    cover: made.frames.map(({ utc_mid }) => Date.parse(utc_mid)),
  });
  return (
    <NightProvider made={made} sky={sky} objects={objects.items} observers={observers} serverNow={now}>
      <NightHead />
      <NightStrip />
      <NightTabs />
      {children}
    </NightProvider>
  );
}
