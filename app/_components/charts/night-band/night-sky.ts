import { type Interval, type TimeWindow } from '@/lib/astro/altitude-search';
import { moonLight } from '@/lib/astro/moon';
import { moonNight } from '@/lib/astro/moon-night';
import { nightBounds } from '@/lib/astro/night-bounds';
import type { Site } from '@/lib/astro/site';
import { skyMoment } from '@/lib/astro/sky-moment';
import { airmassCurve, skyTrack } from '@/lib/astro/sky-track';
import { type SunBelow, type SunNight, sunNight } from '@/lib/astro/sun-night';

/** All that the sky does in one night at one place, as plain data: made on the server, drawn in the browser. Times in ms. */
export interface NightSky {
  /** What the strip shows: sunset to sunrise, wider where frames were taken in daylight close by. */
  readonly start: number;
  readonly end: number;
  /** What happens at sunset, twilight and sunrise; null where it does not happen in this night. */
  readonly sunset: number | null;
  readonly duskEnds: number | null;
  readonly dawnBegins: number | null;
  readonly sunrise: number | null;
  /** Said instead when the Sun does not set, or does not rise. */
  readonly sunNote: string | null;
  readonly utc: readonly number[];
  /** deg, of the grid `utc` */
  readonly sunAltitude: readonly number[];
  /** deg, of the grid `utc` */
  readonly moonAltitude: readonly number[];
  readonly moonUp: readonly { readonly start: number; readonly end: number }[];
  /** 0 to 1, at the middle of the strip */
  readonly moonLit: number;
  readonly isMoonWaxing: boolean;
  readonly curves: readonly FieldCurve[];
}

export interface FieldCurve {
  readonly name: string;
  /** Airmass on the grid `utc`; null below the horizon. */
  readonly airmass: readonly (number | null)[];
}

export interface SkyField {
  readonly name: string;
  /** deg J2000 */
  readonly ra: number;
  readonly dec: number;
}

export interface NightSkyInput {
  readonly site: Site & { readonly timezone: string };
  /** Local evening date, YYYY-MM-DD. */
  readonly date: string;
  readonly fields: readonly SkyField[];
  /** Mid-exposures to be covered; those far in daylight are only counted at the edge. */
  readonly cover?: readonly number[];
}

const grid_s = 600;
/** The strip grows into daylight by this much at most, or bias frames of the afternoon would squeeze the night. */
const daylight_ms = 90 * 60_000;
const edge_ms = 5 * 60_000;

/** The sky of a night. Deterministic: no clock. */
export function nightSky({ site, date, fields, cover = [] }: NightSkyInput): NightSky {
  const night = nightBounds(date, site.timezone);
  const sun = sunNight(site, night);
  const strip = stripOf(sun, night, cover);
  const track = skyTrack(site, strip, grid_s);
  const moon = moonLight(skyMoment(site, (strip.start + strip.end) / 2));
  return {
    ...strip,
    ...sunEvents(sun),
    utc: [...track.utc],
    sunAltitude: Array.from(track.sunAltitude, oneDecimal),
    moonAltitude: Array.from(track.moonAltitude, oneDecimal),
    moonUp: moonUpWithin(site, night, strip),
    moonLit: Math.round(moon.illuminatedFraction * 1000) / 1000,
    isMoonWaxing: moon.isWaxing,
    curves: fields.map(({ name, ra, dec }) => ({
      name,
      airmass: Array.from(airmassCurve(track, ra, dec).airmass, (airmass) =>
        Number.isFinite(airmass) ? Math.round(airmass * 1000) / 1000 : null,
      ),
    })),
  };
}

const oneDecimal = (value: number) => Math.round(value * 10) / 10;

function below(outcome: SunBelow): Interval | null {
  return outcome.kind === 'below-between' ? outcome : null;
}

function stripOf(sun: SunNight, night: TimeWindow, cover: readonly number[]): TimeWindow {
  const dark = below(sun.limits.horizon);
  if (dark === null) return { start: night.start, end: night.end };
  const within = cover.filter((utc) => utc >= dark.start - daylight_ms && utc <= dark.end + daylight_ms);
  const first = within.reduce((early, utc) => Math.min(early, utc - edge_ms), dark.start);
  const last = within.reduce((late, utc) => Math.max(late, utc + edge_ms), dark.end);
  return { start: Math.max(night.start, first), end: Math.min(night.end, last) };
}

function sunEvents(sun: SunNight) {
  const dark = below(sun.limits.horizon);
  const astronomical = below(sun.limits.astronomical);
  const whole = (utc: number | undefined, at: Interval['startsAt'] | undefined) =>
    utc === undefined || at !== 'crossing' ? null : Math.round(utc);
  const notes = {
    'below-between': null,
    'never-below': 'The Sun does not set',
    'below-throughout': 'The Sun does not rise',
  } as const;
  return {
    sunset: whole(dark?.start, dark?.startsAt),
    duskEnds: whole(astronomical?.start, astronomical?.startsAt),
    dawnBegins: whole(astronomical?.end, astronomical?.endsAt),
    sunrise: whole(dark?.end, dark?.endsAt),
    sunNote:
      notes[sun.limits.horizon.kind] ??
      (sun.limits.astronomical.kind === 'never-below' ? 'No astronomical darkness' : null),
  };
}

function moonUpWithin(site: Site, night: TimeWindow, strip: TimeWindow) {
  const moon = moonNight(site, night);
  if (moon.kind === 'never-up') return [];
  if (moon.kind === 'up-throughout') return [{ start: strip.start, end: strip.end }];
  return moon.intervals
    .map(({ start, end }) => ({
      start: Math.round(Math.max(start, strip.start)),
      end: Math.round(Math.min(end, strip.end)),
    }))
    .filter(({ start, end }) => end > start);
}
