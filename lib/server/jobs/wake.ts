import 'server-only';

/** On globalThis: a bundler may hold this module twice in one process. */
const holder = globalThis as typeof globalThis & { evenfallWake?: Set<() => void> };

/** Tells the runner of this process, if it has one, that work may be due. */
export function wakeRunner(): void {
  holder.evenfallWake?.forEach((wake) => wake());
}

/** Registers a runner; returns how to take it out again. */
export function onWake(wake: () => void): () => void {
  const wakers = (holder.evenfallWake ??= new Set());
  wakers.add(wake);
  return () => void wakers.delete(wake);
}
