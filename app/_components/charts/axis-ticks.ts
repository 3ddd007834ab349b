/** Steps that people read: one, two or five of a power of ten. */
function niceStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough));
  const digit = rough / power;
  return power * (digit <= 1.0001 ? 1 : digit <= 2.0001 ? 2 : digit <= 5.0001 ? 5 : 10);
}

export interface Axis {
  readonly min: number;
  readonly max: number;
  readonly ticks: readonly number[];
  /** Decimals that tell the ticks apart. */
  readonly decimals: number;
}

/** An axis with round ends about some values, and at most so many steps. */
export function axisAbout(min: number, max: number, mostSteps = 6): Axis {
  const room = max > min ? max - min : Math.max(Math.abs(max) * 0.1, 0.1);
  const step = niceStep(room / mostSteps);
  return axisOf(Math.floor(min / step + 1e-9), Math.ceil((min + room) / step - 1e-9), step);
}

function axisOf(first: number, last: number, step: number): Axis {
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const ticks = Array.from({ length: last - first + 1 }, (_, i) =>
    Number(((first + i) * step).toFixed(decimals)),
  );
  return { min: ticks[0] ?? 0, max: ticks.at(-1) ?? 1, ticks, decimals };
}

const hour_ms = 3_600_000;
const timeSteps_ms = [0.25, 0.5, 1, 2, 3, 6, 12, 24, 48, 96, 240].map((hours) => hours * hour_ms);

/** An axis of time, ms, with its ticks on full quarters, hours or days. */
export function timeAxisAbout(min: number, max: number, mostSteps = 6): Axis {
  const rough = Math.max(max - min, hour_ms) / mostSteps;
  const step = timeSteps_ms.find((one) => one >= rough) ?? niceStep(rough / (24 * hour_ms)) * 24 * hour_ms;
  const [first, last] = [Math.floor(min / step), Math.max(Math.ceil(max / step), Math.floor(min / step) + 1)];
  const ticks = Array.from({ length: last - first + 1 }, (_, i) => (first + i) * step);
  return { min: first * step, max: last * step, ticks, decimals: 0 };
}
