import { describe, expect, it } from 'vitest';
import { bands } from '@/lib/contracts/bands';
import { bandOrder, colourForBand, magnitudeInBand } from '@/lib/photometry/bands';
import { expectWithin } from '@/tests/support/numbers';

const column = (value: number): Float64Array => Float64Array.of(value);
/** TPhe C of the published table. */
const stars = {
  V: column(14.376),
  BV: column(-0.298),
  UB: column(-1.217),
  VR: column(-0.148),
  VI: column(-0.36),
};

describe('bands', () => {
  it('have one order in the science code and in the interfaces', () => {
    expect(bandOrder).toEqual(bands);
  });

  it.each([
    ['U', 12.861, -1.217],
    ['B', 14.078, -0.298],
    ['V', 14.376, -0.298],
    ['R', 14.524, -0.148],
    ['I', 14.736, -0.36],
  ] as const)('magnitude and colour index of %s come from V and the colours', (band, magnitude, colour) => {
    const place = bandOrder.indexOf(band);
    expectWithin(magnitudeInBand(stars, 0, place), magnitude, { absolute: 1e-12, unit: 'mag' });
    expect(colourForBand(stars, 0, place)).toBe(colour);
  });

  it('a band that does not exist is refused', () => {
    expect(() => magnitudeInBand(stars, 0, 5)).toThrow(RangeError);
    expect(() => colourForBand(stars, 0, -1)).toThrow(RangeError);
  });
});
