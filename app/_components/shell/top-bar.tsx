import Link from 'next/link';
import type { Route } from 'next';
import type { ReactNode } from 'react';
import type { Light } from '@/lib/contracts/light';
import { Clocks, type ClockSite } from './clocks';
import { Fold } from './fold';
import { LightSwitch } from './light-switch';
import { NavLink } from './nav-link';
import type { Place } from './places';
import { Wordmark } from './wordmark';

/** The signed-in person as the bar shows them. */
export interface ShellPerson {
  readonly name: string;
  readonly email: string;
  /** `observer, principal investigator of MH26B-04` */
  readonly roles: string;
  /** Links to what is theirs, and the form that signs out. */
  readonly menu: ReactNode;
}

export interface TopBarProps {
  readonly light: Light;
  readonly places: readonly Place[];
  readonly person: ShellPerson | null;
  readonly site: ClockSite | null;
  readonly serverNow: number;
}

const sheet =
  'z-30 min-w-52 rounded-panel border border-edge bg-sheet p-3.5 shadow-[0_6px_18px_-6px_var(--sky-night)]';

function PlaceList({ places, className }: { readonly places: readonly Place[]; readonly className: string }) {
  return (
    <ul className={className}>
      {places.map((place) => (
        <li key={place.href}>
          <NavLink place={{ label: place.label, href: place.href }} />
        </li>
      ))}
    </ul>
  );
}

function PersonMenu({ person }: { readonly person: ShellPerson }) {
  return (
    <Fold label={person.name}>
      <div className={`${sheet} absolute right-0 mt-1 max-md:static max-md:mt-1`}>
        <p className="font-medium">{person.email}</p>
        <p className="mb-3 text-small text-ink-2">{person.roles}</p>
        {person.menu}
      </div>
    </Fold>
  );
}

/** The bar of every page: where one can go, what time it is, which light, who one is. */
export function TopBar({ light, places, person, site, serverNow }: TopBarProps) {
  const bar = places.filter((place) => place.part === 'bar');
  const office = places.filter((place) => place.part === 'office');
  return (
    <header className="no-print flex flex-wrap items-center gap-x-6 gap-y-1 border-b border-rule px-4 py-2 md:px-7">
      <Link href={'/' as Route} className="py-1 no-underline">
        <Wordmark />
      </Link>
      {places.length === 0 ? null : (
        <>
          <nav aria-label="Places" className="hidden items-center gap-x-5 lg:flex">
            <PlaceList places={bar} className="flex gap-x-5" />
            {office.length === 0 ? null : (
              <Fold label="Office">
                <PlaceList places={office} className={`${sheet} absolute left-0 mt-1 grid gap-1`} />
              </Fold>
            )}
          </nav>
          <nav aria-label="Places" className="ml-auto lg:hidden">
            <Fold label="Menu">
              <div className={`${sheet} absolute right-0 mt-1 max-h-[80dvh] overflow-auto`}>
                <PlaceList places={bar} className="grid gap-1" />
                {office.length === 0 ? null : (
                  <>
                    <p className="mt-3 mb-1 text-small text-ink-2">Office</p>
                    <PlaceList places={office} className="grid gap-1" />
                  </>
                )}
              </div>
            </Fold>
          </nav>
        </>
      )}
      <div className="flex flex-wrap items-center gap-x-5 gap-y-1 max-lg:w-full lg:ml-auto">
        <Clocks site={site} serverNow={serverNow} />
        <LightSwitch initial={light} isSignedIn={person !== null} />
        {person === null ? null : (
          <div className="max-lg:ml-auto">
            <PersonMenu person={person} />
          </div>
        )}
      </div>
    </header>
  );
}
