import { describe, expect, it } from 'vitest';
import { formatDeclination, formatRightAscension } from '@/app/_components/ui/format-angle';

describe('a position', () => {
  it.each([
    [0, '00:00:00.0'],
    [58.3391667, '03:53:21.4'],
    [359.999999, '00:00:00.0'],
    [14.9999999, '01:00:00.0'],
    [-15, '23:00:00.0'],
  ])('has the right ascension %s deg as %s', (ra, text) => {
    expect(formatRightAscension(ra)).toBe(text);
  });

  it.each([
    [0, '+00:00:00'],
    [-0.0202778, '−00:01:13'],
    [41.9999999, '+42:00:00'],
    [-90, '−90:00:00'],
  ])('has the declination %s deg as %s, its sign never lost at zero degrees', (dec, text) => {
    expect(formatDeclination(dec)).toBe(text);
  });

  it('that is not known shows a dash', () => {
    expect(formatRightAscension(null)).toBe('–');
    expect(formatDeclination(Number.NaN)).toBe('–');
  });
});
