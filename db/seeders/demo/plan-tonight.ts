import { nightOf } from '@/lib/astro/night-bounds';
import { airmassCurve, skyTrack } from '@/lib/astro/sky-track';
import type { Visit } from './demo-world';
import { minute_ms, nightTimes, type NightTimes } from './night-time';
import type { Observables } from './plan-frames';

/** The night in progress and how far it has got [ms since 1970]. */
export interface Tonight {
  readonly night: NightTimes;
  readonly until: number;
}

const eveningLength_ms = 4 * 60 * minute_ms;
const fewestStars = 6;
const lowestAltitude = 25;
const lowestTarget = 35;
const nearestMoon = 20;
const lowAirmass = 2;
/** A round of standards every 45 minutes, targets in between. */
const round_ms = 45 * minute_ms;
const standardsLength_ms = 16 * minute_ms;

/**
 * The night that `now` belongs to, up to now while it is dark. By day it is not the hour at which a night is in progress:
 * then the log holds the first four hours of darkness of the local date's night.
 */
export function tonightAt(now: number, { observatory }: Observables): Tonight {
  const night = nightTimes(observatory.site, nightOf(now, observatory.site.timezone));
  const isDark = now > night.dusk && now < night.dawn;
  return { night, until: isDark ? now : night.dusk + eveningLength_ms };
}

/** Visits that suit the sky of this night: each round a standard field near airmass 2 and a high one, then a target. */
export function planTonight({ night, until }: Tonight, observables: Observables): readonly Visit[] {
  const candidates = fieldsOverNight(night, observables);
  const clock = (utc: number): string => new Date(utc).toISOString().slice(11, 16);
  const first = candidates.highest(night.dusk, []);
  const visits: Visit[] = [
    { at: clock(night.sunset - 40 * minute_ms), type: 'bias', repeats: 5 },
    { at: clock(night.sunset + 22 * minute_ms), type: 'flat', bands: 'BV', repeats: 2 },
    { at: clock(night.dusk - 16 * minute_ms), type: 'focus', object: first, bands: 'V', repeats: 3 },
  ];
  let taken: readonly string[] = [];
  for (
    let at = night.dusk + 2 * minute_ms, round = 0;
    at < Math.min(until, night.dawn);
    at += round_ms, round += 1
  ) {
    const low = candidates.nearAirmass(at, lowAirmass, taken);
    const high = candidates.highest(at, [low]);
    taken = [low];
    const bands = round % 2 === 0 ? 'UBVRI' : 'BV';
    visits.push(
      { at: clock(at), object: low, bands },
      { at: clock(at + standardsLength_ms / 2), object: high, bands },
    );
    const target = candidates.target(at + standardsLength_ms, round);
    if (target !== null) {
      visits.push({ at: clock(at + standardsLength_ms), object: target, bands: 'BV', repeats: 3 });
    }
  }
  return visits;
}

interface Candidates {
  readonly nearAirmass: (utc: number, airmass: number, not: readonly string[]) => string;
  readonly highest: (utc: number, not: readonly string[]) => string;
  readonly target: (utc: number, round: number) => string | null;
}

function fieldsOverNight(night: NightTimes, { observatory, pointings }: Observables): Candidates {
  const step_s = 300;
  const track = skyTrack(observatory.site, night.bounds, step_s);
  const place = (utc: number): number => Math.round((utc - night.bounds.start) / 1000 / step_s);
  const curves = (fields: readonly { readonly name: string; readonly ra: number; readonly dec: number }[]) =>
    fields.map(({ name, ra, dec }) => ({ name, ...airmassCurve(track, ra, dec) }));
  const standards = curves(
    [...pointings.values()]
      .filter(({ nStars }) => nStars >= fewestStars)
      .map(({ field, ra, dec }) => ({ name: field, ra, dec })),
  );
  const targets = curves(observatory.programmes.flatMap((programme) => programme.targets));
  const nearest = (utc: number, airmass: number, not: readonly string[]): string => {
    const distance = (curve: (typeof standards)[number]): number =>
      Math.abs((curve.airmass[place(utc)] ?? Number.NaN) - airmass);
    const at = place(utc);
    const up = standards
      .filter(({ name }) => !not.includes(name))
      .filter(({ altitude }) => (altitude[at] ?? -90) > lowestAltitude)
      .filter(({ moonSeparation }) => (moonSeparation[at] ?? 0) > nearestMoon)
      .toSorted((a, b) => distance(a) - distance(b));
    const [first] = up;
    if (first === undefined) throw new Error(`No standard field is up in the night ${night.date}.`);
    return first.name;
  };
  return {
    nearAirmass: nearest,
    highest: (utc, not) => nearest(utc, 1, not),
    target: (utc, round) => {
      const up = targets.filter((curve) => (curve.altitude[place(utc)] ?? -90) > lowestTarget);
      return up[round % Math.max(1, up.length)]?.name ?? null;
    },
  };
}
