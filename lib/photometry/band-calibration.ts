import type { BandSolution } from './night-solution';
import type { BandCalibration } from './target-measurements';

/** What a solution found of one band, as the transformation takes it.
 * @param solution - of one band of one night
 * @returns the calibration; null where a coefficient could not be determined
 * @throws nothing
 * @accuracy exact
 * @source definition of this program */
export function calibrationOf(solution: BandSolution): BandCalibration | null {
  const { band, outcome, coefficients, covariance, scatter, airmass, colour, hours } = solution;
  if (outcome !== 'determined' || airmass === null || colour === null || hours === null) return null;
  return {
    band,
    names: coefficients.map(({ name }) => name),
    values: Float64Array.from(coefficients, ({ value }) => value ?? Number.NaN),
    covariance,
    scatterObservation: scatter.observation ?? 0,
    scatterFrame: scatter.frame ?? 0,
    airmass,
    colour,
    hours,
  };
}
