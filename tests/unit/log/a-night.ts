import type { Frame } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';

/** The night of 3 November at Larkspur, as pages have it. */
export const night: Night = {
  id: '3kq8v7m2t0xc',
  telescope: 'larkspur',
  date: '2026-11-03',
  state: 'open',
  starts_at: '2026-11-03T12:00:00.000Z',
  ends_at: '2026-11-04T12:00:00.000Z',
  summary: '',
  observers: [],
  opened_by: 'Noor Hathaway',
  closed_by: null,
  closed_at: null,
  reopened_reason: null,
  version: 1,
  frames: 0,
  conditions: 0,
  minutes_lost: 0,
};

export const telescope = {
  code: 'larkspur',
  name: 'Larkspur 0.8 m',
  filters: [
    { band: 'B', name: 'B 438', defaultExposure: 60 },
    { band: 'V', name: 'V', defaultExposure: 30 },
  ],
} as const;

export const objects = [
  { name: 'Thistle 3', kind: 'target', programme: 'MH26B-04', ra: 20.1, dec: 41 },
  { name: 'SA 95', kind: 'standard field', programme: null, ra: 58.4, dec: 0.2 },
] as const;

export function aFrame(told: Partial<Frame> = {}): Frame {
  return {
    id: '3kq8v7m2t0xd',
    number: 41,
    type: 'target',
    file: null,
    object: 'Thistle 3',
    field: null,
    programme: 'MH26B-04',
    ra: 20.1,
    dec: 41,
    band: 'B',
    utc_start: '2026-11-03T22:00:00.000Z',
    exposure: 180,
    utc_mid: '2026-11-03T22:01:30.000Z',
    airmass: 1.2,
    altitude: 56,
    hour_angle: 1,
    moon_separation: 80,
    sun_altitude: -40,
    fwhm: null,
    sky: null,
    comment: '',
    origin: 'log',
    logged_by: 'Noor Hathaway',
    cautions: [],
    version: 1,
    ...told,
  };
}
