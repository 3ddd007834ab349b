import type { BandName } from '@/lib/photometry/bands';
import type { SimulatedBand } from '@/lib/photometry/simulate';
import { readJson } from '../fixture-files';

/** What fixtures/demo/observatory.json holds. */
export interface DemoObservatory {
  readonly observatory: { readonly name: string };
  readonly site: DemoSite;
  readonly telescope: {
    readonly code: string;
    readonly name: string;
    readonly aperture_m: number;
    readonly min_altitude: number;
  };
  readonly camera: DemoCamera;
  readonly filters: readonly {
    readonly band: BandName;
    readonly name: string;
    readonly default_exposure: number;
  }[];
  readonly epoch: { readonly starts_on: string; readonly description: string; readonly colour_terms: object };
  readonly people: readonly {
    readonly email: string;
    readonly name: string;
    readonly roles: readonly string[];
  }[];
  readonly programmes: readonly DemoProgramme[];
}

export interface DemoSite {
  readonly name: string;
  readonly longitude: number;
  readonly latitude: number;
  readonly elevation: number;
  readonly timezone: string;
  readonly mean_extinction: object;
}

export interface DemoCamera {
  readonly name: string;
  readonly width_px: number;
  readonly height_px: number;
  readonly pixel_scale: number;
  readonly gain: number;
  readonly read_noise: number;
  readonly saturation: number;
}

export interface DemoProgramme {
  readonly code: string;
  readonly title: string;
  readonly summary: string;
  readonly proprietary_months: number;
  readonly members: readonly { readonly email: string; readonly role: string }[];
  readonly targets: readonly DemoTarget[];
}

export interface DemoTarget {
  readonly name: string;
  readonly kind: string;
  readonly ra: number;
  readonly dec: number;
  readonly note: string;
}

/** One stay at an object, or one run of calibration frames: each band in turn, the whole as often as `repeats` says. */
export interface Visit {
  /** UTC, hours and minutes: not before. */
  readonly at: string;
  /** Without one the type follows from the object: a standard field or a target. */
  readonly type?: 'bias' | 'flat' | 'focus';
  readonly object?: string;
  readonly bands?: string;
  readonly repeats?: number;
  readonly comment?: string;
}

export interface DemoWeather {
  /** At the zenith in V [arcsec]. */
  readonly seeing: number;
  readonly humidity: number;
  readonly wind: number;
  readonly wind_direction: number;
  readonly temperature: number;
  /** In V, at the zenith, without the Moon [mag per square arcsec]. */
  readonly sky_brightness: number;
  readonly clouds: readonly {
    readonly from: string;
    readonly to: string;
    readonly depth: number;
    readonly unevenness: number;
  }[];
}

export type DemoTruth = Readonly<Partial<Record<BandName, SimulatedBand>>>;

export interface DemoNight {
  readonly date: string;
  readonly seed: number;
  /** Names of standards in whose place another one was measured throughout: the other's name. */
  readonly mistaken?: Readonly<Record<string, string>>;
  /** Whether it has the sample tables with faults, mistakes and other headers. */
  readonly samples?: boolean;
  readonly closed_at: string;
  readonly observers: readonly string[];
  readonly summary: string;
  readonly weather: DemoWeather;
  readonly truth: DemoTruth;
  readonly visits: readonly Visit[];
  readonly remarks: readonly { readonly at: string; readonly text: string }[];
  readonly time_losses: readonly {
    readonly cause: string;
    readonly minutes: number;
    readonly comment: string;
  }[];
}

/** The night in progress: planned for the sky of the date on which the demo is loaded. */
export interface DemoTonight {
  readonly seed: number;
  readonly observers: readonly string[];
  readonly weather: DemoWeather;
  readonly truth: DemoTruth;
  readonly remarks: readonly { readonly minutes_after_dusk: number; readonly text: string }[];
}

/** What fixtures/demo/nights.json holds. */
export interface DemoNights {
  /** Exposure times by object and band, where they differ from the filters' own [s]. */
  readonly exposures: Readonly<Record<string, Readonly<Partial<Record<BandName, number>>>>>;
  readonly nights: readonly DemoNight[];
  readonly tonight: DemoTonight;
}

export interface DemoWorld {
  readonly observatory: DemoObservatory;
  readonly nights: DemoNights;
}

/** The invented observatory and its nights, as the fixtures tell them. */
export async function readDemoWorld(): Promise<DemoWorld> {
  return {
    observatory: await readJson<DemoObservatory>('demo/observatory.json'),
    nights: await readJson<DemoNights>('demo/nights.json'),
  };
}
