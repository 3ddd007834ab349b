/** What a fit is made from: observations of standard stars as plain columns. */
import type { StarColours } from './bands';

/** What a person decided on an observation: the fit decides, the person keeps it out, the person keeps it in. */
export const overrules = { none: 0, keepOut: 1, keepIn: 2 } as const;

/** Observations, shape (n) each; stars, shape (n stars); frames, shape (n frames). */
export interface StandardObservations {
  /** Places of night, star and frame in the lists below. */
  readonly night: Uint16Array;
  readonly star: Uint32Array;
  readonly frame: Uint32Array;
  /** Place of the band in bandOrder. */
  readonly band: Uint8Array;
  readonly instMag: Float64Array;
  readonly instErr: Float64Array;
  readonly airmass: Float64Array;
  /** Hours from the mean time of the standards of its night [h]. */
  readonly hours: Float64Array;
  /** Values of `overrules`. */
  readonly overrule: Uint8Array;
  /** Names for findings in words. */
  readonly starNames: readonly string[];
  /** Numbers of the frames in their night's log, for findings in words. */
  readonly frameNumbers: Uint32Array;
  /** Dates of the nights, for findings in words. */
  readonly nightNames: readonly string[];
  /** Published magnitudes and colours, and their standard errors. */
  readonly standards: StarColours;
  readonly standardErrors: StarColours;
}
