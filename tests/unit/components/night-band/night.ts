import type { BandFrame } from '@/app/_components/charts/night-band/band-input';
import { nightSky, type NightSky } from '@/app/_components/charts/night-band/night-sky';

export const marrowHill = {
  longitude: -17.25,
  latitude: 28.31,
  elevation: 2300,
  timezone: 'Atlantic/Canary',
} as const;

export const fields = [
  { name: 'SA 114', ra: 340.5, dec: 0.9 },
  { name: 'SA 95', ra: 58.4, dec: 0.2 },
  { name: 'Thistle 3', ra: 20.1, dec: 41 },
  { name: 'SA 98', ra: 103, dec: -0.3 },
] as const;

export function autumnNight(cover: readonly number[] = []): NightSky {
  return nightSky({ site: marrowHill, date: '2026-11-03', fields, cover });
}

export function frame(at: string, told: Partial<BandFrame> = {}): BandFrame {
  return { number: 1, type: 'standard', band: 'V', object: 'SA 95', utc: Date.parse(at), ...told };
}
