import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { intervalsBelow, turningPoints } from '@/lib/astro/altitude-search';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261106;
const day = 86_400_000;
const window = { start: 0, end: day };

/** A body that goes up and down once a day, lowest at a chosen time. */
function swing(lowestAt: number, middle: number, reach: number) {
  return (utc: number) => middle - reach * Math.cos((2 * Math.PI * (utc - lowestAt)) / day);
}

describe('the search for crossings', () => {
  it('finds the two crossings of a swing wherever they lie, to a tenth of a second', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.4, max: 0.6, noNaN: true }),
        fc.double({ min: -0.9, max: 0.5, noNaN: true }),
        (lowestAt, level) => {
          const altitudeAt = swing(lowestAt * day, 0, 40);
          const [interval] = intervalsBelow(altitudeAt, turningPoints(altitudeAt, window), 40 * level);
          const half = Math.acos(-level) / (2 * Math.PI);
          expectWithin(interval?.start ?? NaN, (lowestAt - half) * day, { absolute: 100, unit: 'ms' });
          expectWithin(interval?.end ?? NaN, (lowestAt + half) * day, { absolute: 100, unit: 'ms' });
        },
      ),
      { seed },
    );
  });

  it('finds a dip of a few minutes that falls between two samples', () => {
    const altitudeAt = swing(0.5 * day + 7 * 60_000, 0, 40);
    const level = -40 + 1e-3;
    const [interval, ...more] = intervalsBelow(altitudeAt, turningPoints(altitudeAt, window), level);
    expect(more).toHaveLength(0);
    expectWithin((interval?.start ?? NaN) / 60_000, 720 + 7 - 1.62, { absolute: 0.05, unit: 'min' });
    expectWithin((interval?.end ?? NaN) / 60_000, 720 + 7 + 1.62, { absolute: 0.05, unit: 'min' });
  });

  it('finds every interval of a body that dips three times', () => {
    const altitudeAt = (utc: number) => -Math.cos((6 * Math.PI * (utc - day / 6)) / day);
    const intervals = intervalsBelow(altitudeAt, turningPoints(altitudeAt, window), 0);
    expect(intervals.map((i) => Math.round((i.start + i.end) / 2 / 3_600_000))).toEqual([4, 12, 20]);
  });

  it('a body that stays on one side gives none, or the whole window', () => {
    const altitudeAt = swing(day / 2, 0, 10);
    const points = turningPoints(altitudeAt, window);
    expect(intervalsBelow(altitudeAt, points, -11)).toEqual([]);
    expect(intervalsBelow(altitudeAt, points, 11)).toEqual([
      { start: 0, end: day, startsAt: 'window edge', endsAt: 'window edge' },
    ]);
  });

  it('a body that does not move has no turning point and no crossing', () => {
    const points = turningPoints(() => 5, window);
    expect(points.map((point) => point.utc)).toEqual([0, day]);
    expect(intervalsBelow(() => 5, points, 5)).toEqual([]);
  });

  it('an empty, backward, endless or too long window is refused', () => {
    for (const end of [0, -1, NaN, Infinity, 41 * day]) {
      expect(() => turningPoints(() => 0, { start: 0, end })).toThrow(/window/);
    }
  });
});
