import { z } from 'zod';

/** The three lights, by name: what a person chose, and what `data-light` says. */
export const lights = ['day', 'dusk', 'dark-site'] as const;
export const Light = z.enum(lights);
export type Light = z.infer<typeof Light>;

export const lightNames: Readonly<Record<Light, string>> = {
  day: 'Day',
  dusk: 'Dusk',
  'dark-site': 'Dark site',
};

export const lightCookie = 'light';
/** A year, in seconds. */
export const lightCookieAge_s = 31_536_000;

/** The light of a cookie's value; Day for anybody who has not chosen. */
export function lightOf(value: string | undefined): Light {
  const parsed = Light.safeParse(value);
  return parsed.success ? parsed.data : 'day';
}
