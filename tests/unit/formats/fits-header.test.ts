import fitsjs from 'fitsjs';
import { describe, expect, it } from 'vitest';
import { fitsBlock, hasEmptyData, readFitsHeader, type FitsHeader } from '@/lib/formats/fits-header';

/** Cards as a file has them: 80 characters each, filled up to whole blocks. */
function fileOf(cards: readonly string[], end = true): Uint8Array {
  const text = [...cards, ...(end ? ['END'] : [])].map((card) => card.padEnd(80)).join('');
  return new TextEncoder().encode(text.padEnd(Math.ceil(text.length / fitsBlock) * fitsBlock));
}
const simple = 'SIMPLE  =                    T / conforms to FITS';

function headerOf(cards: readonly string[]): FitsHeader {
  const read = readFitsHeader(fileOf([simple, ...cards]));
  if (read.kind !== 'header') throw new Error(`No header: ${read.kind}`);
  return read.header;
}
const valueOf = (card: string) => headerOf([card]).values.get(card.slice(0, 8).trimEnd());

// Rules of FITS standard 4.0, sections 4.1 to 4.2, from memory.
describe('the header of a FITS file', () => {
  it.each([
    ["OBJECT  = 'SA 95   '           / field", 'SA 95'],
    ["OBSERVER= 'O''Neill'", "O'Neill"],
    ["COMMENT1= 'a / b'  / a slash within", 'a / b'],
    ["OBJECT  = 'abc'/comment", 'abc'],
    ["OBJECT  = '  two blanks before'", '  two blanks before'],
    ['EXPTIME =                 40.5 / seconds', 40.5],
    ['GAIN    =             3.25D+02', 325],
    ['NAXIS   =                    0', 0],
    ['SHUT    =                    T/open', true],
    ['EMPTY   =                      / nothing', null],
  ])('reads %s', (card, value) => {
    expect(valueOf(card)).toBe(value);
  });

  it('joins a string that goes on in CONTINUE cards', () => {
    const { values } = headerOf(["FILENAME= 'a long &'", "CONTINUE  'name &'", "CONTINUE  'of a file'"]);
    expect(values.get('FILENAME')).toBe('a long name of a file');
  });

  it('reads HIERARCH keywords, and of a keyword that stands twice the first', () => {
    const { values } = headerOf([
      'HIERARCH TEL FOCUS = 12.5 / mm',
      "OBJECT  = 'first'",
      "OBJECT  = 'second'",
    ]);
    expect(values.get('TEL FOCUS')).toBe(12.5);
    expect(values.get('OBJECT')).toBe('first');
  });

  it('finds the six-hundred-and-first card', () => {
    const many = Array.from({ length: 600 }, (_, i) => `KEY${String(i).padEnd(5)}= ${i}`);
    expect(headerOf([...many, "OBJECT  = 'last'"]).values.get('OBJECT')).toBe('last');
  });

  it('takes whole blocks, and says when more bytes are needed', () => {
    expect(headerOf(Array.from({ length: 40 }, (_, i) => `K${String(i).padEnd(7)}= 1`)).length).toBe(
      2 * fitsBlock,
    );
    expect(readFitsHeader(fileOf([simple, "OBJECT  = 'x'"], false)).kind).toBe('incomplete');
  });

  it('refuses what is no FITS file, with the reason', () => {
    expect(readFitsHeader(new TextEncoder().encode('\x89PNG\r\n\x1a\n and so on'))).toMatchObject({
      kind: 'no-fits',
      reason: expect.stringContaining('SIMPLE') as string,
    });
    expect(readFitsHeader(fileOf([simple, 'OBJECT  = \u0007'])).kind).toBe('no-fits');
  });

  it('tells an empty first part from one with an image', () => {
    expect(hasEmptyData(headerOf(['NAXIS   =                    0']))).toBe(true);
    expect(hasEmptyData(headerOf(['NAXIS   =                    2']))).toBe(false);
  });
});

/** An independent reading: fitsjs 0.6.6, for the plain cards that it reads right. */
describe('the header beside a general-purpose library', () => {
  it.each([
    ['an integer', 'NAXIS   =                    2 / axes', 'NAXIS'],
    ['a number with a fraction', 'EXPTIME =                 40.5 / seconds', 'EXPTIME'],
    ['a number with an exponent', 'SCALE   =              1.5E-03', 'SCALE'],
    ['a string', "OBJECT  = 'SA 95   '           / field", 'OBJECT'],
    ['a time', "DATE-OBS= '2026-11-03T23:41:05.000'", 'DATE-OBS'],
  ])('reads %s alike', (_what, card, keyword) => {
    const text = [simple, 'BITPIX  =                   16', card, 'END']
      .map((one) => one.padEnd(80))
      .join('');
    const theirs = new fitsjs.astro.FITS.Header(text.padEnd(fitsBlock)).get(keyword);
    expect(headerOf([card]).values.get(keyword)).toBe(theirs);
  });
});
