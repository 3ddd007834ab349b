import type { Frame } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import type { NightLog } from '@/lib/contracts/night-log';

/** Whether the person may work on this night at all, whatever its state: the three rights have one rule. */
export function mayWork({ log, close, reopen }: NightLog['may']): boolean {
  return log || close || reopen;
}

/** What the person may do once the night is in a state. */
export function mayIn(may: NightLog['may'], state: Night['state']): NightLog['may'] {
  const works = mayWork(may);
  const isOpen = state === 'open';
  return { ...may, log: works && isOpen, close: works && isOpen, reopen: works && !isOpen };
}

interface Identified {
  readonly id: string;
}

/** A list with a thing in it, in place of its former self if it was there. */
export function withItem<T extends Identified>(items: readonly T[], item: T): readonly T[] {
  return items.some(({ id }) => id === item.id)
    ? items.map((one) => (one.id === item.id ? item : one))
    : [...items, item];
}

export function withoutItem<T extends Identified>(items: readonly T[], id: string): readonly T[] {
  return items.filter((one) => one.id !== id);
}

/** Frames, the latest first, as the table has them. */
export function latestFirst(frames: readonly Frame[]): readonly Frame[] {
  return frames.toSorted((a, b) => Date.parse(b.utc_mid) - Date.parse(a.utc_mid) || b.number - a.number);
}

/** Whether the server knows more, or other, than this page: then the page is made anew. */
export function isBehind(log: NightLog, night: Night): boolean {
  return (
    night.version !== log.night.version ||
    night.state !== log.night.state ||
    night.frames !== log.frames.length ||
    night.conditions !== log.conditions.length ||
    night.minutes_lost !== log.timeLosses.reduce((sum, { minutes }) => sum + minutes, 0)
  );
}
