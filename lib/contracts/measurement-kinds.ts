import { z } from 'zod';

/** What the rows of a table are: only standards are looked for among the published stars. */
export const measurementKinds = ['standard', 'target', 'mixed'] as const;
export const MeasurementKind = z.enum(measurementKinds);
export type MeasurementKind = z.infer<typeof MeasurementKind>;

export const measurementSetStates = ['received', 'checked', 'matched', 'in use', 'refused'] as const;
export const MeasurementSetState = z.enum(measurementSetStates);
export type MeasurementSetState = z.infer<typeof MeasurementSetState>;

/** How far a star may lie from a standard to be it. [arcsec] */
export const tolerances = { smallest: 0.1, usual: 2, largest: 60 } as const;
