import 'server-only';
import type { z } from 'zod';
import { Fault, type Issue } from '@/lib/faults/fault';

const shown = (value: unknown): string | undefined => {
  if (value === undefined || value === null || typeof value === 'object') return undefined;
  return String(value).slice(0, 200);
};

const valueAt = (input: unknown, path: readonly PropertyKey[]): unknown =>
  path.reduce<unknown>(
    (value, key) =>
      typeof value === 'object' && value !== null ? (value as Record<PropertyKey, unknown>)[key] : undefined,
    input,
  );

/** Input by its schema, or a fault that lists everything wrong with it. */
export function parseInput<T extends z.ZodType>(schema: T, input: unknown, where: string): z.output<T> {
  const parsed = schema.safeParse(input);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues.slice(0, 1000).map((issue): Issue => {
    const value = shown(valueAt(input, issue.path));
    return { path: issue.path.join('.'), message: issue.message, ...(value === undefined ? {} : { value }) };
  });
  const count = issues.length === 1 ? 'One thing is' : `${issues.length} things are`;
  throw new Fault('invalid-input', `${count} wrong with the ${where}.`, { issues });
}
