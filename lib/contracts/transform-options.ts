import { z } from 'zod';

/** What a transformation was made with, as it is stored beside its magnitudes. */
const TransformOptions = z.object({
  assumedColour: z.object({ value: z.number(), error: z.number() }).nullable(),
  lowSignal: z.number(),
  largeOffset: z.number(),
  nightWithCare: z.boolean(),
});

/** The options in words, as exports state them. */
export function transformOptionWords(stored: unknown): readonly string[] {
  const { assumedColour, lowSignal, largeOffset } = TransformOptions.parse(stored);
  return [
    assumedColour === null
      ? 'a star without B or without V has no magnitude: no colour is assumed for it'
      : `a star without B or without V is taken to have B-V ${assumedColour.value} ± ${assumedColour.error} mag, and is flagged`,
    `a star is flagged where the signal-to-noise ratio of all that is used in a band is below ${lowSignal}`,
    `a magnitude is flagged where the offset of a frame that it rests on is above ${largeOffset} mag`,
  ];
}
