import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { engineTime } from '@/lib/astro/engine';
import { jdUtc, mjdUtc, utcFromJd, utcFromMjd } from '@/lib/astro/julian-date';
import { taiMinusUtc_s } from '@/lib/astro/leap-seconds';
import { jdTdb, jdTt, tdbMinusTt_s, ttMinusUtc_s } from '@/lib/astro/time-scales';
import { expectWithin } from '@/tests/support/numbers';
import { skyCases, utcOf } from '@/tests/support/sky-oracle';

const seed = 20261102;
/** The figures are printed to 1e-9 d, and doubles at JD 2.4 million are 5e-10 d apart. */
const printed = { absolute: 1.1e-9, unit: 'd' } as const;

describe('Julian dates', () => {
  it.each([
    ['2000-01-01T12:00:00Z', 2451545],
    ['1970-01-01T00:00:00Z', 2440587.5],
    ['1858-11-17T00:00:00Z', 2400000.5],
  ])('%s is JD %d', (text, jd) => {
    expect(jdUtc(Date.parse(text))).toBe(jd);
  });

  it.each(skyCases)('case $id: JD on UTC, TT and TDB, and MJD, are those of the oracle', (sky) => {
    const utc = utcOf(sky.utc);
    expectWithin(jdUtc(utc), Number(sky.jd_utc), printed);
    expectWithin(jdTt(utc), Number(sky.jd_tt), printed);
    expectWithin(jdTdb(utc), Number(sky.jd_tdb), printed);
    expectWithin(mjdUtc(utc), sky.mjd_utc, { absolute: 1e-9, unit: 'd' });
  });

  it('an instant survives the way to JD or MJD and back to the millisecond', () => {
    fc.assert(
      fc.property(fc.integer({ min: Date.UTC(1900, 0), max: Date.UTC(2100, 0) }), (utc) => {
        expect(utcFromJd(jdUtc(utc))).toBe(utc);
        expect(utcFromMjd(mjdUtc(utc))).toBe(utc);
      }),
      { seed },
    );
  });

  it.each([NaN, Infinity])('%d is refused as an instant and as a date', (value) => {
    for (const convert of [jdUtc, mjdUtc, utcFromJd, utcFromMjd, jdTt, jdTdb, taiMinusUtc_s, tdbMinusTt_s]) {
      expect(() => convert(value)).toThrow(RangeError);
    }
  });
});

describe('leap seconds', () => {
  it.each([
    ['1972-01-01T00:00:00.000Z', 10],
    ['1972-06-30T23:59:59.999Z', 10],
    ['1972-07-01T00:00:00.000Z', 11],
    ['1999-06-01T00:00:00.000Z', 32],
    ['2016-12-31T23:59:59.999Z', 36],
    ['2017-01-01T00:00:00.000Z', 37],
    ['2026-11-03T00:00:00.000Z', 37],
  ])('at %s TAI is %d s ahead of UTC', (text, expected) => {
    expect(taiMinusUtc_s(Date.parse(text))).toBe(expected);
  });

  it('each step is one second, and they fall where the IERS put them', () => {
    const halfYears = Array.from({ length: 2 * (2031 - 1972) }, (_, i) => Date.UTC(1972, 6 * i, 1)).slice(1);
    const steps = halfYears.filter((utc) => taiMinusUtc_s(utc) !== taiMinusUtc_s(utc - 1));
    expect(steps.map((utc) => new Date(utc).toISOString().slice(0, 7))).toEqual(
      [
        '1972-07 1973-01 1974-01 1975-01 1976-01 1977-01 1978-01 1979-01 1980-01 1981-07 1982-07 1983-07 1985-07',
        '1988-01 1990-01 1991-01 1992-07 1993-07 1994-07 1996-01 1997-07 1999-01 2006-01 2009-01 2012-07 2015-07',
        '2017-01',
      ].flatMap((line) => line.split(' ')),
    );
    for (const utc of steps) expect(taiMinusUtc_s(utc) - taiMinusUtc_s(utc - 1)).toBe(1);
  });

  it('before 1972 there is no whole number of leap seconds, and the refusal says so', () => {
    expect(() => taiMinusUtc_s(Date.UTC(1971, 11, 31))).toThrow(/only from 1972 on/);
    expect(() => jdTt(Date.UTC(1965, 0, 1))).toThrow(RangeError);
    expect(() => jdTdb(Date.UTC(1965, 0, 1))).toThrow(RangeError);
  });

  it('the engine counts Terrestrial Time by leap seconds, not by its own extrapolation', () => {
    const time = engineTime(Date.UTC(2026, 10, 3));
    expectWithin((time.tt - time.ut) * 86_400, ttMinusUtc_s(Date.UTC(2026, 10, 3)), {
      absolute: 1e-6,
      unit: 's',
    });
    expectWithin((time.tt - time.ut) * 86_400, 69.184, { absolute: 1e-6, unit: 's' });
  });

  it('the engine still has a Terrestrial Time before 1972, some 32 s ahead in 1955', () => {
    const time = engineTime(Date.UTC(1955, 0, 1));
    expectWithin((time.tt - time.ut) * 86_400, 31.1, { absolute: 0.5, unit: 's' });
  });

  it('places are refused outside the years in which they hold', () => {
    expect(() => engineTime(Date.UTC(1899, 11, 31))).toThrow(/1900 to 2099/);
    expect(() => engineTime(Date.UTC(2100, 0, 1))).toThrow(/1900 to 2099/);
    expect(() => engineTime(1e17)).toThrow(/1900 to 2099/);
    expect(() => engineTime(NaN)).toThrow(/finite/);
  });
});

describe('barycentric dynamical time', () => {
  it('swings by 1.7 ms in a year: slow after perihelion, fast before it', () => {
    const april = tdbMinusTt_s(jdTt(Date.UTC(2025, 3, 4)));
    const october = tdbMinusTt_s(jdTt(Date.UTC(2025, 9, 4)));
    expectWithin(april, 0.00166, { absolute: 5e-5, unit: 's' });
    expectWithin(october, -0.00166, { absolute: 5e-5, unit: 's' });
  });
});
