import { measuredAirmasses } from '@/lib/astro/exposure-airmass';
import type { TransformOrder } from './messages';

type Places = Pick<TransformOrder, 'formula' | 'skies' | 'measurements' | 'ra' | 'dec'>;

/** Airmass of each measurement at its star's own place; that of the frame where the star has none. */
export function starAirmasses({ formula, skies, measurements, ra, dec }: Places): {
  readonly airmass: Float64Array;
  readonly nWithoutAirmass: number;
} {
  const { star, frame, frameAirmass } = measurements;
  const airmass = measuredAirmasses(formula, skies, { star, frame, ra, dec });
  let nWithoutAirmass = 0;
  for (const [m, value] of airmass.entries()) {
    if (!Number.isNaN(value)) continue;
    const hasPlace = !Number.isNaN(ra[star[m] ?? 0] ?? NaN);
    if (hasPlace) nWithoutAirmass += 1;
    else airmass[m] = frameAirmass[frame[m] ?? 0] ?? NaN;
  }
  return { airmass, nWithoutAirmass };
}
