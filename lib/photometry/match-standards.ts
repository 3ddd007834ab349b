import { placeAfter } from '@/lib/astro/proper-motion';
import { separation } from '@/lib/astro/separation';
import { skyGrid, type SkyGrid } from '@/lib/astro/sky-grid';

/**
 * Which published standard a measured star is: by name first, then by position on the sphere.
 *
 * Assumptions: all measurements are of one night, so a standard stands at one place for all of them; positions are
 * J2000 coordinates at the epoch of the night, so proper motion is applied to the published ones.
 */

/** Published standards as columns of equal length n. */
export interface StandardTable {
  /** As printed. */
  readonly names: readonly string[];
  /** Names as they are compared. */
  readonly keys: readonly string[];
  /** J2000, epoch 2000.0 [deg], shape (n) */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
  /** Times cos dec; NaN where none is published [mas/yr], shape (n) */
  readonly pmRa: Float64Array;
  readonly pmDec: Float64Array;
  /** Empty, or why the star must not be used, shape (n) */
  readonly unusable: readonly string[];
}

export interface MatchOptions {
  /** How far apart a star and a standard may be to be the same [arcsec] */
  readonly tolerance: number;
  /** Julian years since 2000.0 of the measurements [yr] */
  readonly epoch_years: number;
}

/** A measured star: key '' without a name, NaN without a position [deg]. */
export interface StarToMatch {
  readonly key: string;
  readonly ra: number;
  readonly dec: number;
}

export type StandardMatch =
  | {
      readonly kind: 'matched';
      /** Row of the table of standards. */
      readonly standard: number;
      readonly by: 'name' | 'position';
      /** NaN where the star has no position [arcsec] */
      readonly separation: number;
      /** Empty, or what a person should look at. */
      readonly caution: string;
    }
  | { readonly kind: 'unmatched'; readonly reason: string };

/** From here a name and a position say two things. [arcsec]; our own rule: five times the usual tolerance */
const disagreement = 10;
/** How far the reason for no match looks for a neighbour. [arcsec]; our own rule */
const neighbourhood = 30;

/** Makes a function that matches one star after the other.
 * @param standards - published stars, shape (n) each
 * @param options - tolerance [arcsec], epoch of the measurements [yr since 2000.0]
 * @returns match of a star
 * @throws {RangeError} tolerance not in 0 to 3600 arcsec
 * @accuracy of the places at the epoch: as placeAfter
 * @source our own rules */
export function standardMatcher(
  standards: StandardTable,
  options: MatchOptions,
): (star: StarToMatch) => StandardMatch {
  const byKey = new Map(standards.keys.map((key, index) => [key, index] as const));
  const { ra, dec, pmRa, pmDec } = standards;
  const places = standards.names.map((_, i) =>
    placeAfter({ ra: ra[i]!, dec: dec[i]! }, { pmRa: pmRa[i]!, pmDec: pmDec[i]! }, options.epoch_years),
  );
  const near = skyGrid(Math.max(options.tolerance, neighbourhood));
  places.forEach(({ ra, dec }) => near.add(ra, dec));

  return (star) => {
    const hasPlace = !Number.isNaN(star.ra) && !Number.isNaN(star.dec);
    const named = star.key === '' ? undefined : byKey.get(star.key);
    const place = named === undefined ? undefined : places[named];
    if (named !== undefined && place !== undefined) {
      return matchByName(standards, named, hasPlace ? separation(place, star) * 3600 : NaN);
    }
    if (!hasPlace) {
      return { kind: 'unmatched', reason: 'No standard has this name, and the table gives no position.' };
    }
    return matchByPosition(standards, neighbours(near, star), { star, tolerance: options.tolerance });
  };
}

interface Neighbour {
  readonly standard: number;
  readonly separation: number;
}

function neighbours(grid: SkyGrid, star: StarToMatch): readonly Neighbour[] {
  const found: Neighbour[] = [];
  grid.within(star.ra, star.dec, (standard, distance) => found.push({ standard, separation: distance }));
  return found.length < 2 ? found : found.sort((a, b) => a.separation - b.separation);
}

function matchByName(standards: StandardTable, standard: number, distance: number): StandardMatch {
  const unusable = standards.unusable[standard] ?? '';
  if (unusable !== '') return { kind: 'unmatched', reason: markedReason(standards, standard) };
  const caution =
    distance > disagreement
      ? `The name is that of ${standards.names[standard]}, but the position lies ${shown(distance)} from it.`
      : '';
  return { kind: 'matched', standard, by: 'name', separation: distance, caution };
}

function matchByPosition(
  standards: StandardTable,
  near: readonly Neighbour[],
  { star, tolerance }: { star: StarToMatch; tolerance: number },
): StandardMatch {
  const within = near.filter((one) => one.separation <= tolerance * (1 + 1e-9));
  const [first, second] = within;
  const nameless = star.key === '';
  const lead = nameless ? '' : 'No standard has this name. ';
  if (first === undefined) {
    const next = near[0];
    const hint = next
      ? ` The nearest, ${standards.names[next.standard]}, lies at ${shown(next.separation)}.`
      : '';
    return { kind: 'unmatched', reason: `${lead}No standard lies within ${shown(tolerance)}.${hint}` };
  }
  if (second !== undefined) {
    const list = within
      .map((one) => `${standards.names[one.standard]} at ${shown(one.separation)}`)
      .join(', ');
    const reason = `${lead}${within.length} standards lie within ${shown(tolerance)}: ${list}.`;
    return { kind: 'unmatched', reason: reason.slice(0, 300) };
  }
  if ((standards.unusable[first.standard] ?? '') !== '') {
    return { kind: 'unmatched', reason: markedReason(standards, first.standard) };
  }
  return {
    kind: 'matched',
    standard: first.standard,
    by: 'position',
    separation: first.separation,
    caution: '',
  };
}

const markedReason = (standards: StandardTable, standard: number): string =>
  `${standards.names[standard]} is marked not to be used: ${standards.unusable[standard]}`.slice(0, 300);

const shown = (arcsec: number): string =>
  arcsec < 100
    ? `${arcsec.toFixed(1)}″`
    : arcsec < 3600
      ? `${(arcsec / 60).toFixed(1)}′`
      : `${(arcsec / 3600).toFixed(1)}°`;
