import { describe, expect, it } from 'vitest';
import { instantInNight } from '@/lib/contracts/night-clock';

const night = { starts_at: '2026-11-03T12:00:00.000Z', ends_at: '2026-11-04T12:00:00.000Z' };
/** West of Greenwich noon is late in the UTC day: the night's dates are the next two. */
const hawaiian = { starts_at: '2026-11-03T22:00:00.000Z', ends_at: '2026-11-04T22:00:00.000Z' };

describe('a typed time', () => {
  it.each([
    ['23:41:05', '2026-11-03T23:41:05.000Z'],
    ['23:41', '2026-11-03T23:41:00.000Z'],
    ['2341', '2026-11-03T23:41:00.000Z'],
    ['234105', '2026-11-03T23:41:05.000Z'],
    ['23 41 05.250', '2026-11-03T23:41:05.250Z'],
    ['0:10', '2026-11-04T00:10:00.000Z'],
    ['00:10Z', '2026-11-04T00:10:00.000Z'],
    ['11:59:59', '2026-11-04T11:59:59.000Z'],
    ['12:00', '2026-11-03T12:00:00.000Z'],
    ['2026-11-04T01:02:03Z', '2026-11-04T01:02:03.000Z'],
    ['2026-11-04 01:02', '2026-11-04T01:02:00.000Z'],
  ])('“%s” is %s in the night of 3 November', (typed, utc) => {
    expect(instantInNight(typed, night)).toEqual({ ok: true, utc });
  });

  it('takes the date from the night also where noon is late in the UTC day', () => {
    expect(instantInNight('05:00', hawaiian)).toEqual({ ok: true, utc: '2026-11-04T05:00:00.000Z' });
    expect(instantInNight('23:00', hawaiian)).toEqual({ ok: true, utc: '2026-11-03T23:00:00.000Z' });
  });

  it.each(['', '25:00', '12:60', '23:41:60', 'noon', '1', '23h', '2026-13-01T00:00Z'])(
    '“%s” is refused with a reason',
    (typed) => {
      expect(instantInNight(typed, night)).toEqual({
        ok: false,
        reason: expect.stringMatching(/^is /) as string,
      });
    },
  );

  it('that a night of 23 hours skips is refused', () => {
    const short = { ...night, ends_at: '2026-11-04T11:00:00.000Z' };
    expect(instantInNight('11:30', short)).toEqual({ ok: false, reason: 'is at no time of this night' });
  });
});
