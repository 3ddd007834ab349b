import type { StandardObservations } from '@/lib/photometry/standard-observations';

const joined = (columns: readonly Float64Array[]): Float64Array =>
  Float64Array.from(columns.flatMap((column) => Array.from(column)));

/** Nights of the same standards as one set of observations. */
export function joinNights(nights: readonly StandardObservations[]): StandardObservations {
  const [first] = nights;
  if (first === undefined) throw new Error('There is a night to join.');
  const framesBefore = nights.map((_, k) =>
    nights.slice(0, k).reduce((sum, { frameNumbers }) => sum + frameNumbers.length, 0),
  );
  return {
    night: Uint16Array.from(nights.flatMap(({ star }, k) => Array.from(star, () => k))),
    star: Uint32Array.from(nights.flatMap(({ star }) => Array.from(star))),
    frame: Uint32Array.from(
      nights.flatMap(({ frame }, k) => Array.from(frame, (f) => f + (framesBefore[k] ?? 0))),
    ),
    band: Uint8Array.from(nights.flatMap(({ band }) => Array.from(band))),
    instMag: joined(nights.map(({ instMag }) => instMag)),
    instErr: joined(nights.map(({ instErr }) => instErr)),
    airmass: joined(nights.map(({ airmass }) => airmass)),
    hours: joined(nights.map(({ hours }) => hours)),
    overrule: Uint8Array.from(nights.flatMap(({ overrule }) => Array.from(overrule))),
    starNames: first.starNames,
    frameNumbers: Uint32Array.from(nights.flatMap(({ frameNumbers }) => Array.from(frameNumbers))),
    nightNames: nights.map((_, k) => `night ${k + 1}`),
    standards: first.standards,
    standardErrors: first.standardErrors,
  };
}
