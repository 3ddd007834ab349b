/** Bands in the order in which arrays per band hold them, blue to red. */
export const bandOrder = ['U', 'B', 'V', 'R', 'I'] as const;
export type BandName = (typeof bandOrder)[number];

/** Number of bands: the length of arrays per band. */
export const nBands = bandOrder.length;

/** Place of each band in arrays per band. */
export const bandPlace = { U: 0, B: 1, V: 2, R: 3, I: 4 } as const satisfies Record<BandName, number>;

/**
 * Magnitudes and colours of stars on the standard system, shape (n stars) each; NaN where unknown.
 * Colour indices: U−B for U; B−V for B and V; V−R for R; V−I for I.
 */
export interface StarColours {
  readonly V: Float64Array;
  readonly BV: Float64Array;
  readonly UB: Float64Array;
  readonly VR: Float64Array;
  readonly VI: Float64Array;
}

/** A star's standard magnitude in a band.
 * @param stars - the stars' magnitudes and colours, shape (n) each [mag]
 * @param star - which star, 0 … n − 1 [1]
 * @param band - place of the band in bandOrder [1]
 * @returns the magnitude; NaN where a colour it needs is unknown [mag]
 * @throws {RangeError} when the band does not exist
 * @source definition of the colour indices */
export function magnitudeInBand(stars: StarColours, star: number, band: number): number {
  const v = stars.V[star]!;
  const name = bandOrder[band];
  switch (name) {
    case 'U':
      return v + stars.BV[star]! + stars.UB[star]!;
    case 'B':
      return v + stars.BV[star]!;
    case 'V':
      return v;
    case 'R':
      return v - stars.VR[star]!;
    case 'I':
      return v - stars.VI[star]!;
    default:
      throw new RangeError(`There is no band ${band}.`);
  }
}

/** The colour index that goes with a band in the transformation.
 * @param stars - the stars' magnitudes and colours, shape (n) each [mag]
 * @param star - which star, 0 … n − 1 [1]
 * @param band - place of the band in bandOrder [1]
 * @returns U−B for U, B−V for B and V, V−R for R, V−I for I; NaN where unknown [mag]
 * @throws {RangeError} when the band does not exist
 * @source default colour indices of this program: common practice, no source */
export function colourForBand(stars: StarColours, star: number, band: number): number {
  const name = bandOrder[band];
  switch (name) {
    case 'U':
      return stars.UB[star]!;
    case 'B':
    case 'V':
      return stars.BV[star]!;
    case 'R':
      return stars.VR[star]!;
    case 'I':
      return stars.VI[star]!;
    default:
      throw new RangeError(`There is no band ${band}.`);
  }
}
