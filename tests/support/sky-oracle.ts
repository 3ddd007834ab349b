import type { Site } from '@/lib/astro/site';
import oracle from '../reference/astro-oracle.json';

/** Figures of an outside program for places, times and twilights; conventions stand in the file. */
export const skyCases = oracle.cases.map((entry) => ({ ...entry, place: siteOf(entry.site) }));

export const skyNights = oracle.nights.map(withWindow);
export const highLatitudeNights = oracle.high_latitude_nights.map(withWindow);

/** A time of the oracle, in milliseconds since 1970; it may have more than three decimals. */
export function utcOf(text: string): number {
  return Date.parse(`${text}Z`);
}

export function siteOf(name: string): Site {
  const entry = Object.entries(oracle.sites).find(([key]) => key === name)?.[1];
  if (entry === undefined) throw new Error(`No site ${name} in the oracle.`);
  return { longitude: entry.lon_east_deg, latitude: entry.lat_deg, elevation: entry.height_m };
}

/** The oracle's nights run from local mean noon to local mean noon. */
function withWindow<T extends { readonly site: string; readonly evening_date_local: string }>(night: T) {
  const place = siteOf(night.site);
  const start = Date.parse(`${night.evening_date_local}T12:00:00Z`) - (place.longitude / 360) * 86_400_000;
  return { ...night, place, window: { start, end: start + 86_400_000 } };
}
