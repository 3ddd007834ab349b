import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { isFault, type Issue } from '@/lib/faults/fault';
import { parseInput } from '@/lib/server/http/parse-input';

const Star = z.strictObject({
  name: z.string(),
  band: z.enum(['B', 'V']),
  mag: z.number().max(30, 'must be at most 30'),
});
const oneOrMany = z.union([Star, z.array(Star).min(1, 'must hold a star')]);

function issuesOf(schema: z.ZodType, input: unknown): readonly Issue[] {
  try {
    parseInput(schema, input, 'body');
  } catch (error) {
    if (isFault(error, 'invalid-input')) return error.issues;
    throw error;
  }
  return [];
}

describe('input by schema', () => {
  it('passes what fits', () => {
    expect(parseInput(Star, { name: 'a', band: 'V', mag: 12 }, 'body').mag).toBe(12);
  });

  it('names every fault with its field, its value and what is expected', () => {
    expect(issuesOf(Star, { band: 'Q', mag: 'bright', nmae: 'a' })).toEqual([
      { path: 'name', message: 'is needed' },
      { path: 'band', value: 'Q', message: 'must be one of B, V' },
      { path: 'mag', value: 'bright', message: 'must be of the type number' },
      { path: 'nmae', message: 'is no name known here' },
    ]);
  });

  it('tells of one thing or of a list what is wrong with it, not that neither fits', () => {
    expect(issuesOf(oneOrMany, { name: 'a', band: 'V', mag: 99 })).toEqual([
      { path: 'mag', value: '99', message: 'must be at most 30' },
    ]);
    expect(
      issuesOf(oneOrMany, [
        { name: 'a', band: 'V', mag: 9 },
        { name: 'b', band: 'V', mag: 99 },
      ]),
    ).toEqual([{ path: '1.mag', value: '99', message: 'must be at most 30' }]);
    expect(issuesOf(oneOrMany, [])).toEqual([{ path: '', message: 'must hold a star' }]);
    expect(issuesOf(oneOrMany, 5)).toEqual([{ path: '', value: '5', message: 'must be of the type object' }]);
  });

  it('stops at a thousand faults', () => {
    const many = Array.from({ length: 1500 }, () => ({ name: 'a', band: 'V', mag: 99 }));
    expect(issuesOf(oneOrMany, many)).toHaveLength(1000);
  });
});
