import type { Route } from 'next';
import type { ObservatoryRole } from '@/lib/contracts/roles';

export interface Place {
  readonly label: string;
  readonly href: Route;
  /** In the bar itself, or under Office. */
  readonly part: 'bar' | 'office';
  /** Shown to people with one of these roles; to everybody signed in when absent. The page itself decides who may enter. */
  readonly roles?: readonly ObservatoryRole[];
  /** There only where the demo runs. */
  readonly demoOnly?: boolean;
}

/** Every place of the bar, in its order. A place is added together with its page: a link without one does not compile. */
export const places: readonly Place[] = [
  { label: 'Tonight', href: '/', part: 'bar' },
  { label: 'Nights', href: '/nights', part: 'bar' },
  { label: 'Programmes', href: '/programmes', part: 'bar' },
  { label: 'Standards', href: '/standards', part: 'bar' },
  { label: 'Equipment', href: '/equipment', part: 'bar' },
  { label: 'Jobs', href: '/jobs', part: 'office' },
  { label: 'People', href: '/people', part: 'office', roles: ['manager', 'photometrist'] },
  { label: 'Settings', href: '/settings', part: 'office', roles: ['manager'] },
  { label: 'Audit trail', href: '/audit', part: 'office' },
  { label: 'Mail', href: '/mail', part: 'office', demoOnly: true },
  { label: 'Sample files', href: '/demo-files', part: 'office', demoOnly: true },
];

/** The places that a person sees. */
export function placesFor(roles: readonly ObservatoryRole[], isDemo: boolean): readonly Place[] {
  return places.filter(
    (place) =>
      (place.demoOnly !== true || isDemo) &&
      (place.roles === undefined || place.roles.some((role) => roles.includes(role))),
  );
}
