import 'server-only';

/** On globalThis: a bundler may hold this module twice in one process. */
const holder = globalThis as typeof globalThis & { evenfallBeforeStop?: Set<() => void> };

/** Registers what must end before the process can; returns how to take it back. */
export function beforeStop(end: () => void): () => void {
  const ends = (holder.evenfallBeforeStop ??= new Set());
  ends.add(end);
  return () => void ends.delete(end);
}

/** The process is about to stop: everything registered ends now. */
export function announceStop(): void {
  holder.evenfallBeforeStop?.forEach((end) => end());
}
