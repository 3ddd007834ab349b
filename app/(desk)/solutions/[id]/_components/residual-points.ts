import { axisAbout, timeAxisAbout, type Axis } from '@/app/_components/charts/axis-ticks';
import { formatFixed } from '@/lib/contracts/format-figure';
import { formatIsoDate, formatMinutes } from '@/app/_components/ui/format-time';
import type { SolutionObservation } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';

/** What residuals are drawn against. */
export const against = ['airmass', 'colour', 'utc', 'magnitude'] as const;
export type Against = (typeof against)[number];

export interface ResidualPoint {
  readonly id: string;
  readonly x: number;
  /** The residual; at the axis' end where it lies beyond. [mag] */
  readonly y: number;
  readonly band: Band;
  readonly isUsed: boolean;
  readonly isBeyond: boolean;
}

const values: Readonly<Record<Against, (one: SolutionObservation) => number | null>> = {
  airmass: ({ airmass }) => airmass,
  colour: ({ colour }) => colour,
  utc: ({ utc_mid }) => Date.parse(utc_mid),
  magnitude: ({ magnitude }) => magnitude,
};

/** More marks than this make a chart slow to draw and no clearer to read. */
export const mostPoints = 5000;

/**
 * At most `most` of them, evenly from the order of time. What was rejected, and what stands out the most of its
 * neighbours, stays: those are what one looks for.
 */
export function thinned(
  observations: readonly SolutionObservation[],
  most = mostPoints,
): readonly SolutionObservation[] {
  if (observations.length <= most) return observations;
  const rejected = observations.filter(({ used }) => !used);
  if (rejected.length >= most) return rejected.slice(0, most);
  const used = observations.filter((one) => one.used);
  const perMark = used.length / (most - rejected.length);
  const kept = new Set<SolutionObservation>(rejected);
  for (let start = 0; start < used.length; start += perMark) {
    const group = used.slice(Math.floor(start), Math.max(Math.floor(start) + 1, Math.floor(start + perMark)));
    const far = group.reduce<SolutionObservation | null>(
      (best, one) =>
        best === null || Math.abs(one.residual ?? 0) > Math.abs(best.residual ?? 0) ? one : best,
      null,
    );
    if (far !== null) kept.add(far);
  }
  return observations.filter((one) => kept.has(one));
}

/** Share of the residuals of what was used that set the scale; to how many times them it reaches for what was used, which
 * is 4 σ of normal ones, and for what was rejected. */
const [setScale, reachOfUsed, reachOfRejected] = [0.95, 2, 4];

const sizesOf = (observations: readonly SolutionObservation[]): readonly number[] =>
  observations
    .flatMap(({ residual }) => (residual === null ? [] : [Math.abs(residual)]))
    .sort((a, b) => a - b);

/** An axis on which most residuals can be told apart: single faint stars, and what lies far off, may lie beyond. [mag] */
export function residualAxis(observations: readonly SolutionObservation[]): Axis {
  const used = sizesOf(observations.filter((one) => one.used));
  const rejected = sizesOf(observations.filter((one) => !one.used));
  const most = used[Math.ceil(setScale * used.length) - 1] ?? rejected.at(-1) ?? 0;
  const half = Math.max(
    0.01,
    Math.min(used.at(-1) ?? 0, reachOfUsed * most),
    rejected.findLast((size) => size <= reachOfRejected * most) ?? 0,
  );
  return axisAbout(-1.05 * half, 1.05 * half, 7);
}

export interface ResidualPlot {
  readonly against: Against;
  readonly points: readonly ResidualPoint[];
  readonly x: Axis;
  readonly y: Axis;
  /** How many lie beyond the axis and are drawn at its end. */
  readonly nBeyond: number;
}

/** One chart's points and axes. What has no residual, or no place on the axis, is not drawn. */
export function residualPlot(
  observations: readonly SolutionObservation[],
  name: Against,
  y: Axis,
): ResidualPlot {
  const points = observations.flatMap((one): readonly ResidualPoint[] => {
    const x = values[name](one);
    if (x === null || one.residual === null) return [];
    const isBeyond = one.residual < y.min || one.residual > y.max;
    const inside = Math.min(y.max, Math.max(y.min, one.residual));
    return [{ id: one.observation, x, y: inside, band: one.band, isUsed: one.used, isBeyond }];
  });
  let [min, max] = [Infinity, -Infinity];
  for (const { x } of points) [min, max] = [Math.min(min, x), Math.max(max, x)];
  if (points.length === 0) [min, max] = [0, 1];
  const x = name === 'utc' ? timeAxisAbout(min, max) : axisAbout(min, max);
  return { against: name, points, x, y, nBeyond: points.filter(({ isBeyond }) => isBeyond).length };
}

/** What stands at a tick of the x axis. */
export function tickWords({ against: name, x }: Pick<ResidualPlot, 'against' | 'x'>, value: number): string {
  if (name !== 'utc') return formatFixed(value, x.decimals);
  return x.max - x.min > 3 * 86_400_000 ? formatIsoDate(value).slice(5) : formatMinutes(value);
}
