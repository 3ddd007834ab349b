import 'server-only';
import { roleNames } from '@/lib/contracts/roles';
import { sites } from '@/lib/server/data/equipment';
import { observatory } from '@/lib/server/data/observatory';
import { programmeCodes } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

export interface ShellState {
  /** The place whose time the bar shows; null before there is one. */
  readonly site: { readonly name: string; readonly timezone: string; readonly longitude: number } | null;
  /** `observer, principal investigator of MH26B-04`; empty when nobody is signed in. */
  readonly roles: string;
  readonly isDemo: boolean;
}

/** What the frame around every page shows of the place and of the person in front of it, if anybody is. */
export async function shellState(caller: PersonCaller | null): Promise<ShellState> {
  const [places, codes, house] = await Promise.all([
    sites(),
    caller ? programmeCodes([...caller.programmes.keys()]) : new Map<number, { code: string }>(),
    observatory(),
  ]);
  const [first] = places;
  return {
    site: first ? { name: first.name, timezone: first.timezone, longitude: first.longitude } : null,
    roles: caller ? rolesInWords(caller, codes) : '',
    isDemo: house?.isDemo ?? false,
  };
}

function rolesInWords(caller: PersonCaller, codes: ReadonlyMap<number, { readonly code: string }>): string {
  const own = [...codes].map(([id, { code }]) => ({ code, role: caller.programmes.get(id) }));
  const parts = [
    ...[...caller.roles].map((role) => roleNames[role]),
    ...(['pi', 'coinvestigator'] as const).flatMap((role) => {
      const of = own.filter((one) => one.role === role).map(({ code }) => code);
      return of.length === 0 ? [] : [`${roleNames[role]} of ${of.join(', ')}`];
    }),
  ];
  return parts.length === 0 ? 'no role yet' : parts.join('; ');
}
