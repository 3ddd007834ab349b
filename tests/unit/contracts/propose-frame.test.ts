import { describe, expect, it } from 'vitest';
import { proposeFrame, usualExposure, type FormerFrame } from '@/lib/contracts/propose-frame';

const filters = [
  { band: 'B', defaultExposure: 60 },
  { band: 'V', defaultExposure: 30 },
] as const;
let number = 0;
function frame(band: 'B' | 'V', exposure: number, told: Partial<FormerFrame> = {}): FormerFrame {
  number += 1;
  const place = { field: null, programme: 'MH26B-04', ra: 20.1, dec: 41 };
  return { number, type: 'target', object: 'Thistle 3', ...place, band, exposure, ...told };
}

describe('the next frame', () => {
  it('begins a night with a bias frame', () => {
    expect(proposeFrame([], filters, 0)).toMatchObject({ number: 1, type: 'bias', exposure: 0, band: null });
  });

  it('repeats the last one where there is no sequence yet', () => {
    expect(proposeFrame([frame('B', 180)], filters, 7)).toMatchObject({
      number: 8,
      band: 'B',
      exposure: 180,
    });
  });

  it('goes on in the sequence of bands, with the exposure of that band', () => {
    const latestFirst = [frame('B', 180), frame('V', 90), frame('B', 180)];
    expect(proposeFrame(latestFirst, filters, 3)).toMatchObject({
      band: 'V',
      exposure: 90,
      object: 'Thistle 3',
    });
  });

  it('learns the sequence from frames of the same object only', () => {
    const other = frame('V', 40, { type: 'standard', object: 'SA 95' });
    expect(proposeFrame([frame('B', 180), other, frame('B', 180)], filters, 3)).toMatchObject({ band: 'B' });
  });

  it('takes the filter’s usual exposure where the band is new, and none for bias', () => {
    expect(
      usualExposure([frame('B', 180)], filters, { type: 'target', object: 'Thistle 3', band: 'V' }),
    ).toBe(30);
    expect(usualExposure([], filters, { type: 'bias', object: '', band: null })).toBe(0);
    expect(usualExposure([], filters, { type: 'flat', object: '', band: 'I' })).toBeNull();
  });
});
