import 'server-only';

/**
 * Word within this process that a job has changed, so that those who watch it look at once. Jobs of other processes
 * change without it: a watcher looks at the database from time to time as well.
 */
type Listener = (publicId: string) => void;

/** On globalThis: a bundler may hold this module twice in one process. */
const holder = globalThis as typeof globalThis & { evenfallJobListeners?: Set<Listener> };

export function noteChange(publicId: string): void {
  holder.evenfallJobListeners?.forEach((listener) => listener(publicId));
}

/** Returns how to stop listening. */
export function onChange(listener: Listener): () => void {
  const listeners = (holder.evenfallJobListeners ??= new Set());
  listeners.add(listener);
  return () => void listeners.delete(listener);
}
