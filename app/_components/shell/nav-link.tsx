'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import type { Place } from './places';

/** Whether a place is where we are: its own page, or one under it. */
export function isAt(pathname: string, href: string): boolean {
  return href === '/' ? pathname === '/' : pathname === href || pathname.startsWith(`${href}/`);
}

export function NavLink({ place }: { readonly place: Pick<Place, 'label' | 'href'> }) {
  const isCurrent = isAt(usePathname(), place.href);
  return (
    <Link
      href={place.href}
      aria-current={isCurrent ? 'page' : undefined}
      className="block border-b-2 border-transparent py-1 whitespace-nowrap text-ink-2 no-underline hover:text-ink aria-[current]:border-accent aria-[current]:text-ink"
    >
      {place.label}
    </Link>
  );
}
