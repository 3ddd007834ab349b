import { cloudOffsets } from '@/lib/photometry/simulate-clouds';
import { createRandom, type Random } from '@/lib/numerics/random';
import type { DemoWeather } from './demo-world';
import { clockTime, minute_ms, type NightTimes } from './night-time';

/** The state of the sky at one moment. */
export interface Sky {
  /** At the zenith [arcsec]. */
  readonly seeing: number;
  readonly humidity: number;
  readonly wind: number;
  readonly windDirection: number;
  readonly temperature: number;
  /** Eighths. */
  readonly cloud: number;
}

const step_ms = 30 * minute_ms;

/** A walk that keeps near zero with a spread of one, half an hour a step. */
function walk(random: Random, steps: number): Float64Array {
  const memory = 0.8;
  const values = new Float64Array(steps);
  let value = random.normal();
  for (let i = 0; i < steps; i += 1) {
    values[i] = value;
    value = memory * value + Math.sqrt(1 - memory ** 2) * random.normal();
  }
  return values;
}

/** The weather of a night as a function of time, the same for the same seed. */
export function weatherOf(night: NightTimes, weather: DemoWeather, seed: number): (utc: number) => Sky {
  const steps = Math.ceil((night.bounds.end - night.bounds.start) / step_ms) + 2;
  const walks = [10, 11, 12, 13, 14].map((stream) => walk(createRandom(seed, stream), steps));
  const wave = (which: number, utc: number): number => {
    const place = Math.min(steps - 1.001, Math.max(0, (utc - night.bounds.start) / step_ms));
    const [below, share] = [Math.floor(place), place % 1];
    return (walks[which]?.[below] ?? 0) * (1 - share) + (walks[which]?.[below + 1] ?? 0) * share;
  };
  return (utc) => {
    const sinceSunset_hours = (utc - night.sunset) / (60 * minute_ms);
    const cloud = cloudEighths(night, weather, utc);
    return {
      seeing: weather.seeing * Math.exp(0.1 * wave(0, utc)),
      humidity: Math.min(98, Math.max(5, weather.humidity + 4 * wave(1, utc) + 4 * cloud)),
      wind: Math.max(0, weather.wind + 1.2 * wave(2, utc)),
      windDirection: Math.round(weather.wind_direction + 12 * wave(3, utc) + 360) % 360,
      temperature: weather.temperature - 0.3 * Math.max(-2, sinceSunset_hours) + 0.3 * wave(4, utc),
      cloud,
    };
  };
}

/** Episodes of cloud on a scale of hours from `zero` [ms since 1970]. */
export const cloudEpisodes = (night: NightTimes, weather: DemoWeather, zero: number) =>
  weather.clouds.map(({ from, to, depth, unevenness }) => ({
    from_hours: (clockTime(night, from) - zero) / (60 * minute_ms),
    to_hours: (clockTime(night, to) - zero) / (60 * minute_ms),
    depth,
    unevenness,
  }));

/** Clear below 0.02 mag of extinction, overcast from 1 mag on. */
function cloudEighths(night: NightTimes, weather: DemoWeather, utc: number): number {
  const even = cloudEpisodes(night, weather, utc).map((episode) => ({ ...episode, unevenness: 0 }));
  const extinction = cloudOffsets(Float64Array.of(0), even, createRandom(0))[0] ?? 0;
  return extinction < 0.02 ? 0 : Math.min(8, Math.max(1, Math.round(extinction * 8)));
}
