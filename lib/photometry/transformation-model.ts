/**
 * The transformation from standard to instrumental magnitudes, one band at a time:
 *
 *     m_inst = M + Z + k1·X + T·C + k2·X·C + tau·t + kappa·t·X + T2·C²
 *
 * | symbol | name | unit |
 * |---|---|---|
 * | M | standard magnitude | mag |
 * | C | colour index of the band | mag |
 * | X | airmass | 1 |
 * | t | hours from the mean time of the night's standards | h |
 * | Z | zeroPoint | mag |
 * | k1 | extinction, positive dims | mag per airmass |
 * | T | colourTerm | mag per mag |
 * | k2 | secondOrderExtinction | mag per airmass per mag |
 * | tau | drift of the zero point | mag per hour |
 * | kappa | extinctionDrift | mag per airmass per hour |
 * | T2 | colourTerm2, quadratic | mag per mag² |
 */

export interface BandCoefficients {
  readonly zeroPoint: number;
  readonly extinction: number;
  readonly colourTerm: number;
  readonly secondOrderExtinction: number;
  readonly drift: number;
  readonly extinctionDrift: number;
  readonly colourTerm2: number;
}

/** Where and when an observation was made, and of what colour. */
export interface ObservedState {
  readonly airmass: number;
  readonly colour: number;
  readonly hours: number;
}

/** Instrumental minus standard magnitude: what the equation above adds to M.
 * @param coefficients - of the band
 * @param state - airmass [1], colour [mag], time [h]
 * @returns m_inst − M [mag]
 * @accuracy exact
 * @source Hardie 1962, in Astronomical Techniques, chapter 8, extended by terms linear in time and quadratic in colour */
export function instrumentalOffset(coefficients: BandCoefficients, state: ObservedState): number {
  const { airmass: X, colour: C, hours: t } = state;
  return (
    coefficients.zeroPoint +
    coefficients.extinction * X +
    coefficients.colourTerm * C +
    coefficients.secondOrderExtinction * X * C +
    coefficients.drift * t +
    coefficients.extinctionDrift * t * X +
    coefficients.colourTerm2 * C * C
  );
}
