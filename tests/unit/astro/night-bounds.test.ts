import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nightBounds, nightOf, wallTime } from '@/lib/astro/night-bounds';

const seed = 20261107;
const hour = 3_600_000;
const zones = [
  'Atlantic/Canary',
  'America/Santiago',
  'Pacific/Apia',
  'Asia/Kathmandu',
  'Australia/Lord_Howe',
  'Pacific/Honolulu',
  'UTC',
];

describe('the bounds of a night', () => {
  it.each([
    {
      why: 'winter at Marrow Hill',
      date: '2026-11-02',
      timezone: 'Atlantic/Canary',
      start: '2026-11-02T12:00Z',
      end: '2026-11-03T12:00Z',
    },
    {
      why: 'summer time, one hour ahead',
      date: '2026-07-10',
      timezone: 'Atlantic/Canary',
      start: '2026-07-10T11:00Z',
      end: '2026-07-11T11:00Z',
    },
    {
      why: 'clocks go forward: 23 hours',
      date: '2026-03-28',
      timezone: 'Atlantic/Canary',
      start: '2026-03-28T12:00Z',
      end: '2026-03-29T11:00Z',
    },
    {
      why: 'clocks go back: 25 hours',
      date: '2026-10-24',
      timezone: 'Atlantic/Canary',
      start: '2026-10-24T11:00Z',
      end: '2026-10-25T12:00Z',
    },
    {
      why: 'a zone with odd minutes',
      date: '2026-01-31',
      timezone: 'Asia/Kathmandu',
      start: '2026-01-31T06:15Z',
      end: '2026-02-01T06:15Z',
    },
    {
      why: 'the end of a year',
      date: '2026-12-31',
      timezone: 'Pacific/Honolulu',
      start: '2026-12-31T22:00Z',
      end: '2027-01-01T22:00Z',
    },
    {
      why: 'a leap day',
      date: '2028-02-28',
      timezone: 'UTC',
      start: '2028-02-28T12:00Z',
      end: '2028-02-29T12:00Z',
    },
    {
      why: 'half an hour of summer time',
      date: '2026-04-04',
      timezone: 'Australia/Lord_Howe',
      start: '2026-04-04T01:00Z',
      end: '2026-04-05T01:30Z',
    },
  ])('$why', ({ date, timezone, start, end }) => {
    expect(nightBounds(date, timezone)).toEqual({ start: Date.parse(start), end: Date.parse(end) });
  });

  it('a zone that jumped over a calendar day has a short night before the jump and one after it', () => {
    // Apia went from 29 to 31 December 2011 at midnight.
    const jump = Date.parse('2011-12-30T10:00Z');
    expect(nightBounds('2011-12-29', 'Pacific/Apia')).toEqual({
      start: Date.parse('2011-12-29T22:00Z'),
      end: jump,
    });
    expect(nightBounds('2011-12-30', 'Pacific/Apia')).toEqual({
      start: jump,
      end: Date.parse('2011-12-30T22:00Z'),
    });
  });

  it.each(zones)('in %s every instant lies within the bounds of the night it belongs to', (timezone) => {
    fc.assert(
      fc.property(fc.integer({ min: Date.UTC(2000, 0), max: Date.UTC(2040, 0) }), (utc) => {
        const { start, end } = nightBounds(nightOf(utc, timezone), timezone);
        expect(start <= utc && utc < end).toBe(true);
      }),
      { seed, numRuns: 200 },
    );
  });

  it.each(zones)('in %s each night ends where the next one starts, over six years', (timezone) => {
    const days = Array.from({ length: 6 * 365 }, (_, i) => Date.UTC(2009, 0, 1) + i * 24 * hour);
    const nights = days.map((day) => nightBounds(new Date(day).toISOString().slice(0, 10), timezone));
    expect(nights.slice(1).map((night) => night.start)).toEqual(
      nights.slice(0, -1).map((night) => night.end),
    );
  });
});

describe('the night that an instant belongs to', () => {
  it.each([
    ['the hours after midnight belong to the evening before', '2026-11-03T03:00Z', '2026-11-02'],
    ['local noon begins a night', '2026-11-03T12:00Z', '2026-11-03'],
    ['the millisecond before noon ends one', '2026-11-03T11:59:59.999Z', '2026-11-02'],
    ['in summer noon is an hour earlier', '2026-07-11T11:00Z', '2026-07-11'],
  ])('%s', (_, text, date) => {
    expect(nightOf(Date.parse(text), 'Atlantic/Canary')).toBe(date);
  });

  it('the wall clock keeps its milliseconds, before 1970 too', () => {
    expect(wallTime(Date.parse('2026-07-11T00:00:00.123Z'), 'Atlantic/Canary')).toBe(
      Date.parse('2026-07-11T01:00:00.123Z'),
    );
    expect(wallTime(Date.parse('1969-12-31T23:59:59.250Z'), 'UTC')).toBe(-750);
  });
});

describe('what is no night is refused', () => {
  it.each(['2026-02-29', '2026-13-01', '2026-1-1', '02/11/2026', '2026-11-02T00:00', ''])(
    'the date "%s"',
    (date) => {
      expect(() => nightBounds(date, 'UTC')).toThrow(/not a date of the calendar/);
    },
  );

  it.each(['Mars/Olympus', '', 'GMT+99'])('the time zone "%s"', (timezone) => {
    expect(() => nightBounds('2026-11-02', timezone)).toThrow(/not a time zone/);
    expect(() => nightOf(0, timezone)).toThrow(RangeError);
  });

  it.each([NaN, Infinity])('the instant %d', (utc) => {
    expect(() => nightOf(utc, 'UTC')).toThrow(/finite/);
  });
});
