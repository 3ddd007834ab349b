import { radPerDeg } from '@/lib/astro/angles';
import { readTable } from '../fixture-files';

/** A published standard star, as far as the demo needs it; NaN where a value was not published. */
export interface PublishedStar {
  readonly name: string;
  readonly field: string;
  readonly ra: number;
  readonly dec: number;
  /** Times cos dec [mas/yr]. */
  readonly pmRa: number;
  readonly pmDec: number;
  readonly V: number;
  readonly BV: number;
  readonly UB: number;
  readonly VR: number;
  readonly VI: number;
  readonly error: number;
}

/** Where a telescope points to have as many of a field's stars as possible on its camera. */
export interface Pointing {
  readonly field: string;
  readonly ra: number;
  readonly dec: number;
  readonly nStars: number;
}

type MotionColumn = 'star' | 'pm_ra_mas_yr' | 'pm_dec_mas_yr';
type Column = 'star' | 'field' | 'ra_deg' | 'dec_deg' | 'V' | 'BV' | 'UB' | 'VR' | 'RI' | 'e_V';
/** What the author states as typical; see fixtures/standards/source.json. */
const typicalError = 0.003;

/** The published stars; V−I is the sum of V−R and R−I, as everywhere in the program. */
export async function readPublishedStars(): Promise<readonly PublishedStar[]> {
  const lines = await readTable<Column>('standards/landolt-2009.csv');
  const motions = new Map(
    (await readTable<MotionColumn>('standards/landolt-2009-proper-motions.csv')).map((line) => [
      line.star,
      line,
    ]),
  );
  const value = (text = ''): number => (text === '' ? Number.NaN : Number(text));
  return lines.map((line) => ({
    name: line.star,
    field: line.field,
    ra: Number(line.ra_deg),
    dec: Number(line.dec_deg),
    pmRa: value(motions.get(line.star)?.pm_ra_mas_yr),
    pmDec: value(motions.get(line.star)?.pm_dec_mas_yr),
    V: Number(line.V),
    BV: Number(line.BV),
    UB: value(line.UB),
    VR: value(line.VR),
    VI: value(line.VR) + value(line.RI),
    error: line.e_V === '' ? typicalError : Number(line.e_V),
  }));
}

/** Degrees on the sky from a centre, east and north positive. Good to 0.01 arcsec within a quarter of a degree near the equator. */
export function offsetFrom(
  centre: { readonly ra: number; readonly dec: number },
  star: { readonly ra: number; readonly dec: number },
): { readonly east: number; readonly north: number } {
  const dRa = ((((star.ra - centre.ra + 180) % 360) + 360) % 360) - 180;
  return { east: dRa * Math.cos(star.dec * radPerDeg), north: star.dec - centre.dec };
}

/** Whether a star falls on the camera, with a margin for the frame's edge. `halfWidth` in degrees. */
export function isOnCamera(
  centre: { readonly ra: number; readonly dec: number },
  star: { readonly ra: number; readonly dec: number },
  halfWidth: number,
): boolean {
  const { east, north } = offsetFrom(centre, star);
  return Math.abs(east) < halfWidth && Math.abs(north) < halfWidth;
}

/** For every field the pointing with most stars on a camera of this half width [deg]. */
export function bestPointings(
  stars: readonly PublishedStar[],
  halfWidth: number,
): ReadonlyMap<string, Pointing> {
  const byField = new Map<string, PublishedStar[]>();
  for (const star of stars) byField.set(star.field, [...(byField.get(star.field) ?? []), star]);
  return new Map([...byField].map(([field, members]) => [field, bestPointing(field, members, halfWidth)]));
}

/** Tries each star as a corner of the frame in both directions: the best frame can always be moved until two edges touch stars. */
function bestPointing(field: string, members: readonly PublishedStar[], halfWidth: number): Pointing {
  let best: {
    readonly centre: { ra: number; dec: number };
    readonly inside: readonly PublishedStar[];
  } | null = null;
  const reach = halfWidth * 0.999;
  for (const { ra, dec: southern } of members) {
    const cos = Math.cos(southern * radPerDeg);
    for (const { dec } of members) {
      const centre = { ra: ra + reach / cos, dec: dec + reach };
      const inside = members.filter((star) => isOnCamera(centre, star, halfWidth));
      if (best === null || inside.length > best.inside.length) best = { centre, inside };
    }
  }
  const inside = best?.inside ?? members;
  const middle = (values: readonly number[]): number => (Math.min(...values) + Math.max(...values)) / 2;
  return {
    field,
    ra: Number(middle(inside.map((star) => star.ra)).toFixed(4)),
    dec: Number(middle(inside.map((star) => star.dec)).toFixed(4)),
    nStars: inside.length,
  };
}
