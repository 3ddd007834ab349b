import { frameGeometry, type FrameGeometry } from '@/lib/astro/frame-geometry';
import { moonAltitude, moonLight } from '@/lib/astro/moon';
import { skyMoment } from '@/lib/astro/sky-moment';
import { createRandom, type Random } from '@/lib/numerics/random';
import type { BandName } from '@/lib/photometry/bands';
import type { DemoNights, DemoObservatory, DemoSite, DemoWeather, Visit } from './demo-world';
import { clockTime, minute_ms, type NightTimes } from './night-time';
import type { Pointing } from './standard-fields';
import { weatherOf, type Sky } from './weather';

/** A frame of the demo's log, as the table of frames has it, with its geometry. */
export interface DemoFrame extends FrameGeometry {
  readonly number: number;
  readonly type: 'bias' | 'flat' | 'focus' | 'standard' | 'target';
  readonly file: string;
  readonly object: string;
  readonly field: string | null;
  readonly programme: string | null;
  readonly ra: number | null;
  readonly dec: number | null;
  readonly band: BandName | null;
  /** ms since 1970. */
  readonly utcStart: number;
  readonly exposure_s: number;
  readonly fwhm: number | null;
  readonly sky: number | null;
  readonly comment: string;
}

export interface NightPlan {
  readonly night: NightTimes;
  readonly visits: readonly Visit[];
  readonly weather: DemoWeather;
  readonly seed: number;
  /** No frame begins later [ms since 1970]. */
  readonly until: number;
}

/** What there is to observe, and with what. */
export interface Observables {
  readonly observatory: DemoObservatory;
  readonly exposures: DemoNights['exposures'];
  readonly pointings: ReadonlyMap<string, Pointing>;
}

const readout_s = 22;
const slew_s = 35;
const flatExposure_s = 6;
const focusExposure_s = 5;
/** Width of star images and brightness of the sky in each band, relative to V. */
const seeingFactor = { U: 1.12, B: 1.05, V: 1, R: 0.96, I: 0.93 } as const;
const skyOffset = { U: 0.6, B: 0.95, V: 0, R: -0.75, I: -1.9 } as const;

type Aim = Pick<DemoFrame, 'type' | 'object' | 'field' | 'programme' | 'ra' | 'dec'>;

/** Frames of a night in the order in which they are taken: each visit at its time, or as soon as the one before has ended. */
export function planFrames(plan: NightPlan, observables: Observables): readonly DemoFrame[] {
  const { site } = observables.observatory;
  const skyAt = weatherOf(plan.night, plan.weather, plan.seed);
  const random = createRandom(plan.seed, 20);
  const frames: DemoFrame[] = [];
  let free = plan.night.bounds.start;
  for (const visit of plan.visits) {
    const aim = aimOf(visit, observables);
    free = Math.max(free + (aim.ra === null ? 0 : slew_s * 1000), clockTime(plan.night, visit.at));
    for (const { band, comment } of exposuresOf(visit)) {
      const exposure_s = exposureOf(aim, band, observables);
      if (free > plan.until) return frames;
      const number = frames.length + 1;
      const geometry = frameGeometry({ site, ra: aim.ra, dec: aim.dec, utcStart: free, exposure_s });
      frames.push({
        ...aim,
        ...geometry,
        number,
        file: `lk-${plan.night.date.replaceAll('-', '')}-${String(number).padStart(4, '0')}.fits`,
        band,
        utcStart: free,
        exposure_s,
        comment,
        ...imageOf({ geometry, band, sky: skyAt(geometry.utcMid), plan, site, random }),
      });
      free += (exposure_s + readout_s) * 1000;
    }
  }
  return frames;
}

function exposuresOf(visit: Visit): readonly { readonly band: BandName | null; readonly comment: string }[] {
  const bands = visit.bands === undefined ? [null] : ([...visit.bands] as BandName[]);
  const all = Array.from({ length: visit.repeats ?? 1 }, () => bands).flat();
  return all.map((band, index) => ({ band, comment: index === 0 ? (visit.comment ?? '') : '' }));
}

function aimOf(visit: Visit, { observatory, pointings }: Observables): Aim {
  const nowhere = { field: null, programme: null, ra: null, dec: null };
  if (visit.type === 'bias') return { type: 'bias', object: 'bias', ...nowhere };
  if (visit.type === 'flat') return { type: 'flat', object: 'twilight sky', ...nowhere };
  const object = visit.object ?? '';
  const pointing = pointings.get(object);
  if (pointing !== undefined) {
    const { ra, dec } = pointing;
    const focus = visit.type === 'focus';
    return {
      type: focus ? 'focus' : 'standard',
      object,
      field: focus ? null : object,
      programme: null,
      ra,
      dec,
    };
  }
  for (const { code, targets } of observatory.programmes) {
    const target = targets.find(({ name }) => name === object);
    if (target)
      return { type: 'target', object, field: null, programme: code, ra: target.ra, dec: target.dec };
  }
  throw new Error(`The demo plans ${object}, which is neither a standard field nor a target.`);
}

function exposureOf(
  { type, object }: Aim,
  band: BandName | null,
  { observatory, exposures }: Observables,
): number {
  if (type === 'bias' || band === null) return 0;
  if (type === 'flat') return flatExposure_s;
  if (type === 'focus') return focusExposure_s;
  const usual = observatory.filters.find((filter) => filter.band === band)?.default_exposure;
  const exposure = exposures[object]?.[band] ?? usual;
  if (exposure === undefined) throw new Error(`The demo has no exposure time for ${object} in ${band}.`);
  return exposure;
}

interface ImageInput {
  readonly geometry: FrameGeometry;
  readonly band: BandName | null;
  readonly sky: Sky;
  readonly plan: NightPlan;
  readonly site: DemoSite;
  readonly random: Random;
}

/** Width of star images and sky brightness, as an observer would read them off the frame. */
function imageOf({ geometry, band, sky, plan, site, random }: ImageInput): Pick<DemoFrame, 'fwhm' | 'sky'> {
  const { airmass } = geometry;
  const deviate = random.normal();
  if (airmass === null || band === null) return { fwhm: null, sky: null };
  const fwhm = sky.seeing * seeingFactor[band] * airmass ** 0.6 * (1 + 0.03 * deviate);
  const moment = skyMoment(site, geometry.utcMid);
  const moonHeight = Math.max(0, Math.sin((moonAltitude(moment) * Math.PI) / 180));
  const moonlight = 3 * moonLight(moment).illuminatedFraction ** 2 * moonHeight;
  const brightness = plan.weather.sky_brightness + skyOffset[band] - 0.25 * (airmass - 1) - moonlight;
  return { fwhm: Number(fwhm.toFixed(2)), sky: Number(brightness.toFixed(2)) };
}

/** Moments at which the observer writes down the conditions: every half hour from half an hour before dusk. */
export function conditionTimes(night: NightTimes, until: number): readonly number[] {
  const step = 30 * minute_ms;
  const first = Math.ceil((night.dusk - step) / step) * step;
  const count = Math.max(0, Math.floor((until - first) / step) + 1);
  return Array.from({ length: count }, (_, index) => first + index * step);
}
