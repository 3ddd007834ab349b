import { describe, expect, it } from 'vitest';
import { readDemoSky, observeTonight, withHole } from '@/db/seeders/demo/demo-nights';
import { readDemoWorld } from '@/db/seeders/demo/demo-world';

const world = await readDemoWorld();
const sky = await readDemoSky(world, false);
const months = Array.from({ length: 12 }, (_, month) => `2027-${String(month + 1).padStart(2, '0')}-12`);

describe('the night in progress', () => {
  it.each(months)(
    'at 3 in the morning of %s it has standards low and high, all well above the horizon',
    (date) => {
      const now = Date.parse(`${date}T03:00:00Z`);
      const { frames, night } = observeTonight(world, sky, now);
      const standards = frames.filter(({ type }) => type === 'standard');
      const airmasses = standards.map(({ airmass }) => airmass ?? Number.NaN);
      expect(standards.length).toBeGreaterThan(20);
      expect(Math.min(...airmasses)).toBeLessThan(1.3);
      expect(Math.max(...airmasses)).toBeGreaterThan(1.7);
      expect(Math.max(...airmasses)).toBeLessThan(2.4);
      expect(standards.every(({ moonSeparation }) => (moonSeparation ?? 0) > 19)).toBe(true);
      expect(frames.every(({ utcStart }) => utcStart <= now)).toBe(true);
      expect(night.date < date).toBe(true);
    },
  );

  it.each([
    ['at noon', '2026-12-01T12:30:00Z', '2026-12-01'],
    ['in the morning', '2026-12-01T09:00:00Z', '2026-11-30'],
    ['before dusk', '2026-12-01T19:00:00Z', '2026-12-01'],
  ])('%s it is the night of that date with the first hours of darkness', (_when, now, date) => {
    const { night, frames } = observeTonight(world, sky, Date.parse(now));
    expect(night.date).toBe(date);
    expect(frames.length).toBeGreaterThan(60);
    expect(Math.max(...frames.map(({ utcStart }) => utcStart))).toBeLessThanOrEqual(
      night.dusk + 4 * 3_600_000,
    );
  });

  it('its log misses the frames of one standard field, which is not the last one', () => {
    const { frames } = observeTonight(world, sky, Date.parse('2026-12-01T23:00:00Z'));
    const { logged, missing } = withHole(frames);
    expect(missing.length).toBeGreaterThan(1);
    expect(new Set(missing.map(({ object, type }) => `${type} ${object}`)).size).toBe(1);
    expect(logged.length + missing.length).toBe(frames.length);
    const after = Math.max(...missing.map(({ number }) => number));
    expect(logged.some(({ type, number }) => type === 'standard' && number > after)).toBe(true);
  });

  it('a log of a few frames has no hole', () => {
    const { frames } = observeTonight(world, sky, Date.parse('2026-12-01T19:50:00Z'));
    expect(withHole(frames).missing).toEqual([]);
  });
});
