import type { NightSky } from './night-sky';

/** Roles of the sky's colours by the Sun's altitude, deg; between two of them they are mixed. */
const shades = [
  { altitude: 0, role: 'sky-0' },
  { altitude: -6, role: 'sky-6' },
  { altitude: -12, role: 'sky-12' },
  { altitude: -18, role: 'sky-18' },
  { altitude: -27, role: 'sky-night' },
] as const;

/** The sky's colour under a Sun at an altitude, as CSS over the roles of the present light. */
export function skyColour(sunAltitude: number): string {
  const next = shades.findIndex((shade) => shade.altitude <= sunAltitude);
  const darker = shades[next];
  const lighter = shades[next - 1];
  if (next === 0) return 'var(--sky-0)';
  if (darker === undefined || lighter === undefined) return 'var(--sky-night)';
  const share = Math.round(((lighter.altitude - sunAltitude) / (lighter.altitude - darker.altitude)) * 100);
  return `color-mix(in srgb, var(--${darker.role}) ${share}%, var(--${lighter.role}))`;
}

export interface ShadeStop {
  /** 0 to 1 along the strip. */
  readonly offset: number;
  readonly colour: string;
}

/** Stops of the strip's gradient; runs of one colour keep their two ends only. */
export function skyStops({ start, end, utc, sunAltitude }: NightSky): readonly ShadeStop[] {
  const stops = utc.map((time, i) => ({
    offset: Math.round(((time - start) / (end - start)) * 10_000) / 10_000,
    colour: skyColour(sunAltitude[i] ?? -90),
  }));
  return stops.filter(({ colour }, i) => colour !== stops[i - 1]?.colour || colour !== stops[i + 1]?.colour);
}
