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

type ZodIssue = z.core.$ZodIssue;

/**
 * The issues of a union are those of the one form that the input was meant to have: one object, or a list of them. Zod
 * itself says no more than that none fits.
 */
function flat(issue: ZodIssue): readonly ZodIssue[] {
  if (issue.code !== 'invalid_union') return [issue];
  const isOfForm = (issues: readonly ZodIssue[]): boolean =>
    !issues.some(({ code, path }) => code === 'invalid_type' && path.length === 0);
  const meant = issue.errors.find(isOfForm) ?? issue.errors[0] ?? [];
  const issues = meant.map((inner) => ({ ...inner, path: [...issue.path, ...inner.path] }) as ZodIssue);
  return issues.length === 0 ? [issue] : issues.flatMap(flat);
}

/** The issue's own words where its schema has none of ours. */
function wordsOf(issue: ZodIssue, value: unknown): string {
  if (issue.code === 'invalid_type' && value === undefined) return 'is needed';
  if (!issue.message.startsWith('Invalid ')) return issue.message;
  if (issue.code === 'invalid_type') return `must be of the type ${issue.expected}`;
  if (issue.code === 'invalid_value') return `must be one of ${issue.values.map(String).join(', ')}`;
  return issue.message;
}

function toIssues(issue: ZodIssue, input: unknown): readonly Issue[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      path: [...issue.path, key].join('.'),
      message: 'is no name known here',
    }));
  }
  const value = valueAt(input, issue.path);
  const seen = shown(value);
  const found = { path: issue.path.join('.'), message: wordsOf(issue, value) };
  return [seen === undefined ? found : { ...found, value: seen }];
}

/** Input by its schema, or a fault that lists everything wrong with it. */
export function parseInput<T extends z.ZodType>(schema: T, input: unknown, where: string): z.output<T> {
  const parsed = schema.safeParse(input);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues
    .flatMap(flat)
    .flatMap((issue) => toIssues(issue, input))
    .slice(0, 1000);
  const count = issues.length === 1 ? 'One thing is' : `${issues.length} things are`;
  throw new Fault('invalid-input', `${count} wrong with the ${where}.`, { issues });
}
