import { describe, expect, it } from 'vitest';
import { magnitudePerRelativeFlux, signalToNoise } from '@/lib/photometry/ccd-noise';
import { expectWithin } from '@/tests/support/numbers';
import reference from '@/tests/reference/ccd-noise.json';

const noise = { nPixels: 80, nBackground: 400, sky: 50, dark: 1, readNoise: 8, gain: 1.5 };

describe('noise of aperture photometry', () => {
  it.each(reference.rows)(
    'S/N of %d electrons (%d pixels, background of %d) is the published formula’s',
    (...row) => {
      const [star, nPixels, nBackground, sky, dark, readNoise, gain, snr, error] = row as [
        number,
        number,
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const found = signalToNoise(star, { nPixels, nBackground, sky, dark, readNoise, gain });
      expectWithin(found, snr, { absolute: 5e-5, unit: '(S/N)' });
      expectWithin(magnitudePerRelativeFlux / found, error, { absolute: 5e-7, unit: 'mag' });
    },
  );

  it.each([
    ['a star without electrons', () => signalToNoise(0, noise)],
    ['a star that is not a number', () => signalToNoise(Number.NaN, noise)],
    ['an aperture without pixels', () => signalToNoise(100, { ...noise, nPixels: 0 })],
    ['a sky that is not a number', () => signalToNoise(100, { ...noise, sky: Number.NaN })],
  ])('%s is refused', (_what, attempt) => {
    expect(attempt).toThrow(RangeError);
  });
});
