/** Noise of aperture photometry with a CCD. Electrons throughout. */

/** Magnitude error of a relative flux error of one: 2.5 / ln 10 [mag]. */
export const magnitudePerRelativeFlux = 1.0857362047581296;

/** Standard deviation of the rounding to whole counts, 1/sqrt(12) as quoted in the source [counts]. */
const digitisation_counts = 0.289;

export interface ApertureNoise {
  /** Pixels in the aperture. */
  readonly nPixels: number;
  /** Pixels from which the sky was estimated. */
  readonly nBackground: number;
  /** Sky [electrons per pixel]. */
  readonly sky: number;
  /** Dark current [electrons per pixel]. */
  readonly dark: number;
  /** Read noise [electrons rms]. */
  readonly readNoise: number;
  /** Gain [electrons per count]. */
  readonly gain: number;
}

/** Signal-to-noise ratio of a star in an aperture.
 * @param star - electrons of the star in the aperture, > 0 [electrons]
 * @param noise - what else is in the aperture [electrons, pixels]
 * @returns the ratio [1]
 * @throws {RangeError} when the star has no electrons, or a value is negative or not finite
 * @accuracy the formula's own; it knows neither scintillation nor flat-field errors
 * @source Merline and Howell 1995, Experimental Astronomy 6, 163 */
export function signalToNoise(star: number, noise: ApertureNoise): number {
  const { nPixels, nBackground, sky, dark, readNoise, gain } = noise;
  if (!(star > 0) || !Number.isFinite(star)) throw new RangeError(`A star has electrons, not ${star}.`);
  if (!(nPixels > 0) || !(nBackground > 0))
    throw new RangeError('An aperture and its background have pixels.');
  const perPixel = sky + dark + readNoise ** 2 + (gain * digitisation_counts) ** 2;
  if (!(perPixel >= 0) || !Number.isFinite(perPixel))
    throw new RangeError('Noise per pixel is finite and not negative.');
  return star / Math.sqrt(star + nPixels * (1 + nPixels / nBackground) * perPixel);
}
