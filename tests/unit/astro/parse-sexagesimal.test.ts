import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { type ParsedAngle, parseDeclination, parseRightAscension } from '@/lib/astro/parse-sexagesimal';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261109;

describe('reading a right ascension', () => {
  it.each([
    ['12:34:56.7', 188.73625],
    ['12 34 56.7', 188.73625],
    ['12h34m56.7s', 188.73625],
    ['12h 34m 56.7s', 188.73625],
    ['12H34M56.7', 188.73625],
    [' 12:34:56.7 ', 188.73625],
    ['+12:34:56.7', 188.73625],
    ['188.73625', 188.73625],
    ['188d44m10.5s', 188.73625],
    ['188°44′10.5″', 188.73625],
    ['12.5h', 187.5],
    ['12:30', 187.5],
    ['12 30.5', 187.625],
    ['12h30m', 187.5],
    ['0', 0],
    ['-0', 0],
    ['00:00:00', 0],
    ['5', 5],
    ['5.', 5],
    ['23:59:59.999', 359.99999583333334],
    ['1:2:3', 15.5125],
    ['12\u00a034\u00a056.7', 188.73625],
  ])('%j is %d°', (text, degrees) => {
    expectWithin(degreesOf(parseRightAscension(text)), degrees, { absolute: 1e-10, unit: 'deg' });
  });

  it.each([
    ['', 'is empty'],
    ['   ', 'is empty'],
    ['+', 'is empty'],
    ['24:00:00', '24 hours or more'],
    ['25h', '24 hours or more'],
    ['360', '360 degrees or more'],
    ['361d00m', '360 degrees or more'],
    ['-12:34:56', 'is negative'],
    ['-5.2', 'is negative'],
    ['12:60:00', '60 minutes or more'],
    ['12:34:60', '60 seconds or more'],
    ['12:34:60.0', '60 seconds or more'],
    ['12:-34:56', 'sign that is not at the front'],
    ['12,5', 'comma'],
    ['12:34,5', 'comma'],
    ['12:34.5:10', 'decimals before its last part'],
    ['12.5 30', 'decimals before its last part'],
    ['12:34:56:78', 'more than three parts'],
    ['12 34:56', 'is not a position'],
    ['1e2', 'is not a position'],
    ['NaN', 'is not a position'],
    ['Infinity', 'is not a position'],
    ['12h34d56', 'is not a position'],
    ['12:', 'is not a position'],
    [':30', 'is not a position'],
    ['12::30', 'is not a position'],
    ['0x10', 'is not a position'],
    ['twelve', 'is not a position'],
    ['1234567', 'is not a position'],
    ['--5', 'sign that is not at the front'],
  ])('%j is refused: %s', (text, reason) => {
    expect(reasonOf(parseRightAscension(text))).toContain(reason);
  });
});

describe('reading a declination', () => {
  it.each([
    ['-12:34:56.7', -12.582416666666667],
    ['\u221212:34:56.7', -12.582416666666667],
    ['\u201312 34 56.7', -12.582416666666667],
    ['+12d34m56.7s', 12.582416666666667],
    ['12°34′56.7″', 12.582416666666667],
    ['12°34\'56.7"', 12.582416666666667],
    ["12°34'56.7''", 12.582416666666667],
    ['- 12 34 56.7', -12.582416666666667],
    ['-00:00:12', -12 / 3600],
    ['-00 30', -0.5],
    ['-0.5', -0.5],
    ['90', 90],
    ['-90:00:00', -90],
    ['12.5d', 12.5],
  ])('%j is %d°', (text, degrees) => {
    expectWithin(degreesOf(parseDeclination(text)), degrees, { absolute: 1e-10, unit: 'deg' });
  });

  it('minus zero is zero', () => {
    expect(degreesOf(parseDeclination('-00:00:00'))).toBe(0);
  });

  it.each([
    ['90:00:00.1', 'beyond the pole'],
    ['-91', 'beyond the pole'],
    ['100:00:00', 'beyond the pole'],
    ['12h30m', 'is in hours'],
    ['5h', 'is in hours'],
    ['-12:60:00', '60 minutes or more'],
    ['-12:00:61', '60 seconds or more'],
    ['', 'is empty'],
    ['-', 'is empty'],
    ['+-5', 'sign that is not at the front'],
    ['12:34:5-6', 'sign that is not at the front'],
    ['north', 'is not a position'],
  ])('%j is refused: %s', (text, reason) => {
    expect(reasonOf(parseDeclination(text))).toContain(reason);
  });
});

describe('there and back', () => {
  it('what is written with six decimals is read back to half of the last', () => {
    const half = 0.5e-6 / 3600;
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 359.999999, noNaN: true }),
        fc.double({ min: -90, max: 90, noNaN: true }),
        (ra, dec) => {
          const raBack = degreesOf(parseRightAscension(formatRightAscension(ra, 6)));
          expectWithin(((raBack - ra + 540) % 360) - 180, 0, { absolute: 15 * half * 1.01, unit: 'deg' });
          expectWithin(degreesOf(parseDeclination(formatDeclination(dec, 6))), dec, {
            absolute: half * 1.01,
            unit: 'deg',
          });
        },
      ),
      { seed },
    );
  });

  it('no text at all makes the reader throw', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.stringMatching(/^[-+0-9hdms:. ]{0,16}$/)), (text) => {
        for (const parse of [parseRightAscension, parseDeclination]) {
          const parsed = parse(text);
          expect(parsed.ok ? Number.isFinite(parsed.degrees) : parsed.reason.length > 0).toBe(true);
        }
      }),
      { seed, numRuns: 2000 },
    );
  });
});

function degreesOf(parsed: ParsedAngle): number {
  if (!parsed.ok) throw new Error(`Refused: it ${parsed.reason}`);
  return parsed.degrees;
}

function reasonOf(parsed: ParsedAngle): string {
  return parsed.ok ? `accepted as ${parsed.degrees}` : parsed.reason;
}
