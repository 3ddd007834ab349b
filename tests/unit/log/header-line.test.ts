import { describe, expect, it } from 'vitest';
import type { FitsValue } from '@/lib/formats/fits-header';
import { bandOf, headerLine } from '../../../app/(log)/nights/[id]/_components/header-line';
import { objects, telescope } from './a-night';

const context = { filters: telescope.filters, objects };
const line = (values: Readonly<Record<string, FitsValue>>) =>
  headerLine(new Map(Object.entries(values)), 'n1103_0042.fits', context);

describe('a FITS header in the log', () => {
  it('gives type, object, band, start, exposure and file', () => {
    const values = {
      OBJECT: 'thistle-3',
      IMAGETYP: 'Light Frame',
      FILTER: 'V',
      'DATE-OBS': '2026-11-03T22:00:00.25',
      EXPTIME: 60,
      RA: 20.5,
      DEC: 41.2,
    };
    expect(line(values)).toMatchObject({
      type: 'target',
      object: 'Thistle 3',
      band: 'V',
      start: '2026-11-03T22:00:00.25Z',
      exposure: '60',
      file: 'n1103_0042.fits',
      // The log knows where Thistle 3 is better than the telescope's pointing.
      ra: '',
      dec: '',
    });
  });

  it.each([
    ['Bias Frame', 'bias'],
    ['zero', 'bias'],
    ['DARK', 'dark'],
    ['Sky Flat', 'flat'],
    ['focus', 'focus'],
    ['object', 'target'],
  ])('takes the type %s as %s', (word, type) => {
    expect(line({ IMAGETYP: word }).type).toBe(type);
  });

  it('takes a frame of a standard field as one of standards', () => {
    expect(line({ OBJECT: 'SA95', IMAGETYP: 'science' })).toMatchObject({
      type: 'standard',
      object: 'SA 95',
    });
  });

  it('takes the header’s place for an object that the log does not know', () => {
    expect(line({ OBJECT: 'comet', RA: '12:30:00', DEC: '-05:00:00' })).toMatchObject({
      ra: '12:30:00',
      dec: '-05:00:00',
    });
  });

  it('joins date and time that stand apart', () => {
    expect(line({ 'DATE-OBS': '2026-11-03', 'UTC-OBS': '22:00:05' }).start).toBe('2026-11-03T22:00:05Z');
  });

  it('leaves a start in another time scale to the person', () => {
    expect(line({ 'DATE-OBS': '2026-11-03T22:00:00', TIMESYS: 'TT' }).start).toBe('');
  });

  it.each([
    ['B 438', 'B'],
    ['Johnson V', 'V'],
    ['V_123', 'V'],
    ['Clear', null],
    ['Halpha', null],
  ])('takes the filter %s as the band %s', (name, band) => {
    expect(bandOf(name, telescope.filters)).toBe(band);
  });
});
