import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import '@fontsource/ibm-plex-mono/400.css';
import '@fontsource/ibm-plex-mono/500.css';
import '@fontsource/ibm-plex-sans/400.css';
import '@fontsource/ibm-plex-sans/500.css';
import '@fontsource/ibm-plex-sans/600.css';
import { last_hours } from '@/lib/astro/sidereal-time';
import { lightCookie, lightOf } from '@/lib/contracts/light';
import { currentCaller } from '@/lib/server/identity/current-caller';
import { shellState } from '@/lib/server/reads/shell';
import { PersonMenu } from './_components/shell/person-menu';
import { placesFor } from './_components/shell/places';
import { Shell } from './_components/shell/shell';
import './globals.css';

async function chosenLight() {
  return lightOf((await cookies()).get(lightCookie)?.value);
}

/** A server's page is made once, at its time; the clocks run on from it. */
async function presentTime() {
  return Date.now();
}

export async function generateMetadata(): Promise<Metadata> {
  const light = await chosenLight();
  return {
    title: { template: '%s · Evenfall', default: 'Evenfall' },
    description: 'Night log and photometric calibration',
    icons: { icon: light === 'dark-site' ? '/icon-dark-site.svg' : '/icon.svg' },
  };
}

/** The browser's own frame takes the page's colour: these repeat `--ground` of tokens.css. */
const grounds = { day: '#f5f2ea', dusk: '#14171f', 'dark-site': '#000000' } as const;

export async function generateViewport(): Promise<Viewport> {
  const light = await chosenLight();
  return {
    width: 'device-width',
    initialScale: 1,
    themeColor: grounds[light],
    colorScheme: light === 'day' ? 'light' : 'dark',
  };
}

export default async function RootLayout({ children }: { readonly children: ReactNode }) {
  const [light, now, caller] = await Promise.all([chosenLight(), presentTime(), currentCaller()]);
  const { site, roles, isDemo } = await shellState(caller);
  const person = caller && { name: caller.name, email: caller.email, roles, menu: <PersonMenu /> };
  const clocks = site && {
    name: site.name,
    timezone: site.timezone,
    siderealAtServerNow_hours: last_hours(now, site.longitude),
  };
  const places = caller ? placesFor([...caller.roles], isDemo) : [];
  return (
    <html lang="en-GB" data-light={light} suppressHydrationWarning>
      <body>
        <Shell light={light} places={places} person={person} site={clocks} serverNow={now}>
          {children}
        </Shell>
      </body>
    </html>
  );
}
