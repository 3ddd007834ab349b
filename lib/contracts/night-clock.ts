/** Times of day as an observer types them, as instants of the night: the date follows from noon to noon. */

export interface NightSpan {
  readonly starts_at: string;
  readonly ends_at: string;
}

export type ReadInstant =
  { readonly ok: true; readonly utc: string } | { readonly ok: false; readonly reason: string };

const day_ms = 86_400_000;
const clock = /^(\d{1,2})(?:[:\s]?(\d{2}))(?:[:\s]?(\d{2}(?:\.\d{1,3})?))?\s*Z?$/i;
const full = /^\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(:\d{2}(\.\d{1,3})?)?Z?$/i;

function no(reason: string): ReadInstant {
  return { ok: false, reason };
}

function dayTime_ms(text: string): number | null {
  const match = clock.exec(text);
  if (match === null) return null;
  const [hour, minute, second] = [Number(match[1]), Number(match[2]), Number(match[3] ?? 0)];
  if (hour > 23 || minute > 59 || second >= 60) return null;
  return Math.round((hour * 3600 + minute * 60 + second) * 1000);
}

/**
 * Reads a UTC time such as 23:41:05, 2341, or in full 2026-11-03T23:41:05Z. In a night of 25 hours one time of day
 * comes twice: the first is meant, unless the whole instant is written.
 */
export function instantInNight(typed: string, night: NightSpan): ReadInstant {
  const text = typed.trim();
  if (text === '') return no('is needed');
  if (full.test(text)) {
    const utc = Date.parse(text.replace(' ', 'T').replace(/z?$/i, 'Z'));
    return Number.isFinite(utc)
      ? { ok: true, utc: new Date(utc).toISOString() }
      : no('is not an instant of the calendar');
  }
  const time = dayTime_ms(text);
  if (time === null) return no('is not a time: write 23:41:05 or 2341');
  const [start, end] = [Date.parse(night.starts_at), Date.parse(night.ends_at)];
  const midnight = Math.floor(start / day_ms) * day_ms;
  const found = [0, 1, 2]
    .map((day) => midnight + day * day_ms + time)
    .find((utc) => utc >= start && utc < end);
  return found === undefined
    ? no('is at no time of this night')
    : { ok: true, utc: new Date(found).toISOString() };
}
