import { z } from 'zod';

/** Bands of the standard system, blue to red. */
export const bands = ['U', 'B', 'V', 'R', 'I'] as const;
export const Band = z.enum(bands);
export type Band = z.infer<typeof Band>;

export const frameTypes = ['bias', 'dark', 'flat', 'standard', 'target', 'focus', 'test'] as const;
export const FrameType = z.enum(frameTypes);
export type FrameType = z.infer<typeof FrameType>;
