import { describe, expect, it } from 'vitest';
import {
  blankCondition,
  conditionLineOf,
  readCondition,
  type ConditionLine,
} from '../../../app/(log)/nights/[id]/_components/condition-line';
import { compassPoint, readDirection } from '../../../app/(log)/nights/[id]/_components/wind-words';
import { night } from './a-night';

const typed = (told: Partial<ConditionLine>) =>
  readCondition({ ...blankCondition, utc: '23:20', ...told }, night);

describe('a conditions entry', () => {
  it('holds what was looked at, and nothing for what was not', () => {
    expect(typed({ cloud: '1', wind: '4.2', wind_direction: 'nw', temperature: '−1.5' })).toEqual({
      ok: true,
      input: {
        utc: '2026-11-03T23:20:00.000Z',
        cloud: 1,
        seeing: null,
        humidity: null,
        wind: 4.2,
        wind_direction: 315,
        temperature: -1.5,
        sky_brightness: null,
        comment: '',
      },
    });
  });

  it.each([
    [{ cloud: '9' }, { cloud: 'must be 0 to 8 eighths' }],
    [{ cloud: '1.5' }, { cloud: 'must be a whole number of eighths' }],
    [{ humidity: '120' }, { humidity: 'must be 0 to 100 %' }],
    [{ seeing: '1,4' }, { seeing: 'is not a number: write 1.4' }],
    [{ wind_direction: 'up' }, { wind_direction: 'is neither N, NE … NW nor degrees' }],
    [{ utc: '', cloud: '1' }, { utc: 'is needed' }],
    [{}, { entry: 'An entry needs at least one reading or a comment.' }],
  ] as const)('with %j is refused', (told, faults) => {
    expect(typed(told)).toEqual({ ok: false, faults });
  });

  it('comes back as it was typed', () => {
    const read = typed({ cloud: '2', wind_direction: 'NW', wind: '3', comment: 'low in the west' });
    const stored = { id: 'x', recorded_by: 'Noor', ...(read.ok ? read.input : ({} as never)) };
    expect(conditionLineOf(stored as Parameters<typeof conditionLineOf>[0])).toMatchObject({
      utc: '23:20:00',
      cloud: '2',
      wind_direction: 'NW',
      comment: 'low in the west',
    });
  });

  it.each([
    [0, 'N'],
    [350, 'N'],
    [315, 'NW'],
    [200, 'S'],
  ])('calls a wind from %s° one from %s', (degrees, point) => {
    expect(compassPoint(degrees)).toBe(point);
  });

  it('takes 360° as north and refuses more', () => {
    expect([readDirection('360'), readDirection('361')]).toEqual([0, null]);
  });
});
