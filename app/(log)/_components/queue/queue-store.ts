import { z } from 'zod';
import { QueueEntry } from './queue-entry';

/**
 * The entries that wait, in the browser's own storage, so that a reload, a crash or a flat battery loses none. All tabs
 * see the same list.
 */
const place = 'evenfall.log-queue';
/** What an older version left and this one cannot read is put aside, not thrown away. */
const aside = 'evenfall.log-queue.unreadable';

interface Stored {
  readonly text: string | null;
  readonly entries: readonly QueueEntry[];
}

const nothing: readonly QueueEntry[] = [];
let known: Stored = { text: null, entries: nothing };
let isKept = true;
const listeners = new Set<() => void>();

function parse(text: string | null): readonly QueueEntry[] {
  if (text === null) return nothing;
  try {
    const list = z.array(z.unknown()).parse(JSON.parse(text));
    const read = list.map((item) => QueueEntry.safeParse(item));
    if (read.some(({ success }) => !success)) localStorage.setItem(aside, text);
    return read.flatMap(({ data }) => data ?? []);
  } catch {
    // Somebody else's text under our name, or cut off in writing: kept aside for a person to look at.
    localStorage.setItem(aside, text);
    return nothing;
  }
}

/** The entries as they are stored now; the same array while nothing changed. */
export function readQueue(): readonly QueueEntry[] {
  if (!isKept) return known.entries;
  const text = localStorage.getItem(place);
  if (text !== known.text) known = { text, entries: parse(text) };
  return known.entries;
}

/** Before the page has reached a browser there is none. */
export function emptyQueue(): readonly QueueEntry[] {
  return nothing;
}

/** False when the browser refuses to keep anything: then entries live as long as the page. */
export function isQueueKept(): boolean {
  return isKept;
}

/** Changes the list as it is stored at this moment, whichever tab wrote it last. */
export function changeQueue(change: (entries: readonly QueueEntry[]) => readonly QueueEntry[]): void {
  const entries = change(readQueue());
  const text = JSON.stringify(entries);
  try {
    localStorage.setItem(place, text);
    isKept = true;
  } catch {
    // Storage is full or forbidden. The entries are still sent from memory, and the panel says that they are not kept.
    isKept = false;
  }
  known = { text, entries };
  for (const listener of listeners) listener();
}

export function followQueue(listener: () => void): () => void {
  listeners.add(listener);
  window.addEventListener('storage', listener);
  return () => {
    listeners.delete(listener);
    window.removeEventListener('storage', listener);
  };
}
