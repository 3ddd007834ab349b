import 'server-only';
import { nightBounds, nightOf } from '@/lib/astro/night-bounds';
import { skyTrack, type SkyTrack } from '@/lib/astro/sky-track';
import { sunNight } from '@/lib/astro/sun-night';
import { telescopes } from '@/lib/server/data/equipment';
import { instrumentByCode } from '@/lib/server/data/instruments';

/** The dark hours of the night in which an instant lies, at one telescope. */
export interface TonightSky {
  readonly telescope: { readonly code: string; readonly name: string; readonly minAltitude: number };
  readonly night: { readonly date: string; readonly start: number; readonly end: number } | null;
  /** Null when it does not get dark. */
  readonly track: SkyTrack | null;
}

const step_s = 300;

export interface TelescopeChoice {
  readonly code: string;
  readonly name: string;
}

/** Telescopes that one may choose from. */
export async function telescopeChoices(): Promise<readonly TelescopeChoice[]> {
  const rows = await telescopes({ limit: 1000, inUse: true });
  return rows.map(({ code, name }) => ({ code, name }));
}

/**
 * The sky over a telescope in the night of `now`, between the twilights: astronomical ones, or nautical ones where the
 * Sun does not sink lower. Null for a code that is not there.
 */
export async function tonightSky(code: string, now: number): Promise<TonightSky | null> {
  const instrument = await instrumentByCode(code);
  if (!instrument) return null;
  const date = nightOf(now, instrument.timezone);
  const { limits } = sunNight(instrument, nightBounds(date, instrument.timezone));
  const dark = [limits.astronomical, limits.nautical].find(({ kind }) => kind !== 'never-below');
  const window =
    dark?.kind === 'below-between'
      ? { start: dark.start, end: dark.end }
      : dark?.kind === 'below-throughout'
        ? nightBounds(date, instrument.timezone)
        : null;
  const { name, minAltitude } = instrument;
  return {
    telescope: { code, name, minAltitude },
    night: window && { date, ...window },
    track: window && skyTrack(instrument, window, step_s),
  };
}
