import { degPerRad, normaliseRightAscension, radPerDeg } from '@/lib/astro/angles';
import { separation } from '@/lib/astro/separation';
import { skyGrid, type SkyGrid } from '@/lib/astro/sky-grid';
import type { EquatorialPlace } from '@/lib/astro/vector';

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
const masPerDeg = 3_600_000;

/** Makes a function that matches one star after the other.
 * @param standards - published stars, shape (n) each
 * @param options - tolerance [arcsec], epoch of the measurements [yr since 2000.0]
 * @returns match of a star
 * @throws {RangeError} tolerance not in 0 to 3600 arcsec
 * @accuracy proper motion as a straight line in the tangent plane: below 0.001 arcsec over 50 years at 10 arcsec/yr
 * @source our own rules */
export function standardMatcher(
  standards: StandardTable,
  options: MatchOptions,
): (star: StarToMatch) => StandardMatch {
  const byKey = new Map(standards.keys.map((key, index) => [key, index] as const));
  const places = standards.names.map((_, index) => placeAtEpoch(standards, index, options.epoch_years));
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

/** Where a standard stands at the epoch of the measurements.
 * @param standards - published stars
 * @param index - row of the table [1]
 * @param years - Julian years since 2000.0 [yr]
 * @returns J2000 coordinates [deg]; the published ones where no proper motion is
 * @throws nothing
 * @accuracy as standardMatcher
 * @source definition of proper motion */
export function placeAtEpoch(
  standards: Pick<StandardTable, 'ra' | 'dec' | 'pmRa' | 'pmDec'>,
  index: number,
  years: number,
): EquatorialPlace {
  const [ra, dec] = [standards.ra[index]!, standards.dec[index]!];
  const [pmRa, pmDec] = [standards.pmRa[index]!, standards.pmDec[index]!];
  if (Number.isNaN(pmRa) || Number.isNaN(pmDec)) return { ra, dec };
  const xi_rad = ((pmRa * years) / masPerDeg) * radPerDeg;
  const eta_rad = ((pmDec * years) / masPerDeg) * radPerDeg;
  // In the tangent plane at the published place, so that a star near a pole moves rightly too.
  const [sin, cos] = [Math.sin(dec * radPerDeg), Math.cos(dec * radPerDeg)];
  const below = cos - eta_rad * sin;
  return {
    ra: normaliseRightAscension(ra + Math.atan2(xi_rad, below) * degPerRad),
    dec: Math.atan2(sin + eta_rad * cos, Math.hypot(xi_rad, below)) * degPerRad,
  };
}
