/** Where an instant lies on the strip, and what instant lies at a place. */
export interface TimeScale {
  readonly start: number;
  readonly end: number;
  readonly width: number;
}

export function xOf({ start, end, width }: TimeScale, utc: number): number {
  return ((utc - start) / (end - start)) * width;
}

/** The instant at a place, kept within the strip. */
export function utcAt({ start, end, width }: TimeScale, x: number): number {
  return start + (Math.min(width, Math.max(0, x)) / width) * (end - start);
}

export const minute_ms = 60_000;

/** Selections run in whole minutes. */
export function toMinute(utc: number): number {
  return Math.round(utc / minute_ms) * minute_ms;
}

export interface HourTick {
  readonly x: number;
  /** `23:00`; null where labels would be too close. */
  readonly text: string | null;
}

const hour_ms = 3_600_000;
/** A label and the space around it, px. */
const labelRoom = 46;

/** Full hours of UTC, labelled as often as there is room. */
export function hourTicks(scale: TimeScale): readonly HourTick[] {
  const perHour = (hour_ms / (scale.end - scale.start)) * scale.width;
  const step = [1, 2, 3, 6, 12].find((hours) => hours * perHour >= labelRoom) ?? 24;
  const ticks: HourTick[] = [];
  for (let utc = Math.ceil(scale.start / hour_ms) * hour_ms; utc <= scale.end; utc += hour_ms) {
    const hour = new Date(utc).getUTCHours();
    const x = xOf(scale, utc);
    const hasRoom = x >= labelRoom / 3 && x <= scale.width - labelRoom / 3;
    ticks.push({ x, text: hour % step === 0 && hasRoom ? `${String(hour).padStart(2, '0')}:00` : null });
  }
  return ticks;
}
