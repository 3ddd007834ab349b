import { describe, expect, it } from 'vitest';
import {
  faultsOf,
  lineOf,
  proposedLine,
  readFigure,
  readLine,
  wordOf,
  type FrameLine,
} from '../../../app/(log)/nights/[id]/_components/frame-line';
import { frameChange } from '../../../app/(log)/nights/[id]/_components/frame-patch';
import { aFrame, night, telescope } from './a-night';

const now = Date.parse('2026-11-03T23:41:05.600Z');
const reading = { night, telescope, now };
const good: FrameLine = {
  ...proposedLine({
    number: 47,
    type: 'standard',
    object: 'SA 95',
    field: null,
    programme: null,
    ra: null,
    dec: null,
    band: 'B',
    exposure: 40,
  }),
};
const faults = (told: Partial<FrameLine>) => {
  const read = readLine({ ...good, ...told }, reading);
  return read.ok ? {} : read.faults;
};

describe('a line of the log', () => {
  it('without a start begins now, to the second', () => {
    expect(readLine(good, reading)).toMatchObject({
      ok: true,
      input: {
        number: 47,
        type: 'standard',
        object: 'SA 95',
        band: 'B',
        exposure: 40,
        utc_start: '2026-11-03T23:41:05.000Z',
      },
    });
  });

  it('understands the beginnings of words and letters of any case', () => {
    expect(readLine({ ...good, type: 'tar', band: 'v' }, reading)).toMatchObject({
      ok: true,
      input: { type: 'target', band: 'V' },
    });
  });

  it('takes a place in either notation', () => {
    expect(readLine({ ...good, ra: '01:20:24', dec: '−41 00 00' }, reading)).toMatchObject({
      ok: true,
      input: { ra: expect.closeTo(20.1, 9) as number, dec: -41 },
    });
  });

  it.each([
    [{ type: 'stellar' }, 'type', 'is none of bias, dark, flat, standard, target, focus, test'],
    [{ type: '' }, 'type', 'is needed'],
    [{ band: 'X' }, 'band', 'is none of U, B, V, R, I'],
    [{ band: '' }, 'band', 'is needed for a standard frame'],
    [{ band: 'U' }, 'band', 'Larkspur 0.8 m has no filter for it: it has B, V'],
    [{ object: ' ' }, 'object', 'is needed for a standard frame'],
    [{ exposure: '12,5' }, 'exposure', 'is not a number: write 12.5'],
    [{ exposure: '' }, 'exposure', 'is needed'],
    [{ exposure: '0' }, 'exposure', 'must be above 0 s'],
    [{ start: '25:00' }, 'start', 'is not a time: write 23:41:05 or 2341'],
    [{ number: '0' }, 'number', 'must be at least 1'],
    [{ ra: '12:00:00' }, 'dec', 'is needed with ra'],
    [{ dec: '95' }, 'dec', 'lies beyond the pole (more than 90 degrees).'],
    [{ fwhm: '-1' }, 'fwhm', 'must be above 0″'],
  ] as const)('with %j is refused at the field %s', (told, field, message) => {
    expect(faults(told)).toMatchObject({ [field]: message });
  });

  it('must say its start where nothing stands in for it', () => {
    expect(readLine(good, { ...reading, now: null })).toEqual({ ok: false, faults: { start: 'is needed' } });
  });

  it('names all its faults at once', () => {
    expect(Object.keys(faults({ type: 'x', band: 'y', exposure: 'z' })).toSorted()).toEqual([
      'band',
      'exposure',
      'type',
    ]);
  });

  it('needs no exposure, band or object for a bias frame', () => {
    expect(readLine({ ...good, type: 'bias', band: '', object: '', exposure: '' }, reading)).toMatchObject({
      ok: true,
      input: { type: 'bias', exposure: 0 },
    });
  });

  it('says a frame again as it was, so that a correction changes only what was changed', () => {
    const frame = aFrame({ comment: 'thin cloud', fwhm: 1.4, file: 'n1103_0041.fits' });
    const read = readLine(lineOf(frame), { ...reading, now: null });
    expect(read.ok && frameChange(frame, read.input)).toEqual({});
    const changed = readLine({ ...lineOf(frame), exposure: '120', comment: '' }, reading);
    expect(changed.ok && frameChange(frame, changed.input)).toEqual({ exposure: 120, comment: '' });
  });

  it('takes a value out when its field is emptied', () => {
    const frame = aFrame({ fwhm: 1.4, programme: null });
    const read = readLine({ ...lineOf(frame), fwhm: '', ra: '', dec: '' }, reading);
    expect(read.ok && frameChange(frame, read.input)).toEqual({ fwhm: null, ra: null, dec: null });
  });

  it('shows what the server refuses beside the field that it is about', () => {
    expect(
      faultsOf([
        { path: 'utc_start', message: 'lies outside' },
        { path: 'number', message: 'is taken' },
      ]),
    ).toEqual({
      start: 'lies outside',
      number: 'is taken',
    });
  });
});

describe('a typed word', () => {
  it.each([
    ['b', null],
    ['bi', 'bias'],
    ['bias', 'bias'],
    ['', null],
  ])('“%s” among bias and blank is %s', (typed, word) => {
    expect(wordOf(['bias', 'blank'], typed)).toBe(word);
  });
});

describe('a typed figure', () => {
  it.each([
    ['12.5', 12.5],
    ['−3', -3],
    [' .5 ', 0.5],
    ['1e3', null],
    ['1,5', null],
    ['', null],
    ['Infinity', null],
  ])('“%s” is %s', (typed, value) => {
    expect(readFigure(typed)).toBe(value);
  });
});
