/**
 * Instrumental magnitudes from counts: m = −2.5 log10(F / t), with F counts of the whole exposure and t its seconds.
 */

/** Magnitudes per factor of ten in brightness. [mag/dex] @source Pogson 1856, MNRAS 17, 12 */
const magPerDex = 2.5;
/** Magnitudes per unit of relative error, 2.5 / ln 10 = 1.0857… [mag] @source derivative of Pogson's definition */
const magPerRelativeError = magPerDex / Math.LN10;

/** Instrumental magnitude of a count.
 * @param flux - counts of the whole exposure [counts], above 0
 * @param exposure_s - exposure time [s], above 0
 * @returns −2.5 log10(flux / exposure) [mag]
 * @throws {RangeError} flux or exposure not above 0, or not finite
 * @accuracy rounding
 * @source Pogson 1856, MNRAS 17, 12 */
export function magnitudeOfFlux(flux: number, exposure_s: number): number {
  requirePositive(flux, 'Counts');
  requirePositive(exposure_s, 'An exposure');
  return -magPerDex * Math.log10(flux / exposure_s);
}

/** Standard error of the magnitude of a count.
 * @param flux - counts [counts], above 0
 * @param fluxErr - their standard error [counts], above 0
 * @returns 1.0857… fluxErr / flux [mag]
 * @throws {RangeError} flux or error not above 0, or not finite
 * @accuracy first order: good while fluxErr is a small part of flux
 * @source propagation of error through Pogson's definition */
export function magnitudeErrorOfFlux(flux: number, fluxErr: number): number {
  requirePositive(flux, 'Counts');
  requirePositive(fluxErr, 'A standard error');
  return (magPerRelativeError * fluxErr) / flux;
}

function requirePositive(value: number, what: string): void {
  if (!(value > 0 && value < Infinity))
    throw new RangeError(`${what} must be above 0 and finite, not ${value}.`);
}
