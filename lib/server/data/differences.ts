import 'server-only';

interface Differences<T> {
  readonly before: Partial<T>;
  readonly after: Partial<T>;
}

/** The fields in which two states of one thing differ, as they were and as they are: what an audit row keeps. */
export function differences<T extends object>(
  before: T,
  after: T,
  ignored: readonly (keyof T)[] = [],
): Differences<T> {
  const keys = (Object.keys(after) as (keyof T)[]).filter(
    (key) => !ignored.includes(key) && JSON.stringify(before[key]) !== JSON.stringify(after[key]),
  );
  const pick = (from: T): Partial<T> =>
    Object.fromEntries(keys.map((key) => [key, from[key]])) as unknown as Partial<T>;
  return { before: pick(before), after: pick(after) };
}
