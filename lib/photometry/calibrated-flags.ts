/** Cautions on a calibrated magnitude, one bit each. Exports write their names, pages their words. */
export const calibratedFlags = {
  colour_range: { bit: 0, words: 'Colour outside the range of the standards' },
  airmass_range: { bit: 1, words: 'Airmass outside the range of the standards' },
  single_band: { bit: 2, words: 'Measured in one band only' },
  assumed_colour: { bit: 3, words: 'Colour assumed, not measured' },
  saturated: { bit: 4, words: 'A pixel at or near the saturation of the camera' },
  low_signal: { bit: 5, words: 'Low signal' },
  night_with_care: { bit: 6, words: 'The night is usable with care' },
  frame_offset: { bit: 7, words: 'On a frame with a large offset' },
  time_range: { bit: 8, words: 'Outside the time covered by the standards' },
} as const satisfies Readonly<Record<string, { readonly bit: number; readonly words: string }>>;
export type CalibratedFlag = keyof typeof calibratedFlags;

const flagNames = Object.keys(calibratedFlags) as readonly CalibratedFlag[];

/** Names of the flags that are set, in the order of their bits.
 * @param flags - bit field [1]
 * @returns their names
 * @source definition of this program */
export const namesOfFlags = (flags: number): readonly CalibratedFlag[] =>
  flagNames.filter((name) => (flags & (1 << calibratedFlags[name].bit)) !== 0);
