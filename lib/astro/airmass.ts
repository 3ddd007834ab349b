/**
 * Airmass X: the star's path through the air, in units of the path at the zenith.
 *
 * | symbol | code name              | unit | meaning                                    |
 * | z_t    | zenithDistance         | deg  | true zenith distance, without refraction   |
 * | z_a    | apparentZenithDistance | deg  | apparent zenith distance, through the air  |
 * | h      | altitude               | deg  | 90 − z_a                                   |
 *
 * Young 1994 asks for z_t; the other four ask for z_a. `airmass` takes z_t for all and adds the refraction itself.
 */
import { radPerDeg } from './angles';
import { apparentZenithDistance } from './refraction';

export const airmassFormulas = [
  'young1994',
  'hardie1962',
  'kastenYoung1989',
  'pickering2002',
  'secZ',
] as const;
export type AirmassFormula = (typeof airmassFormulas)[number];

/** Beyond it Hardie's polynomial turns over (largest value 13.4 at 87.15°) and becomes negative. [deg] */
export const hardieLimit = 85;

/** Airmass by the chosen formula, always from the true zenith distance.
 * @param formula - which of the five
 * @param zenithDistance - true, without refraction [deg], 0 ≤ z ≤ 90
 * @returns airmass [1]
 * @throws {RangeError} below the horizon or not finite; Hardie beyond 85° of apparent zenith distance
 * @accuracy 1e-5 against the published formula; refraction 1010 hPa, 10 °C where the formula asks for it
 * @source that of each formula; Saemundsson 1986, Sky & Telescope 72, 70 for the refraction */
export function airmass(formula: AirmassFormula, zenithDistance: number): number {
  requireAboveHorizon(zenithDistance);
  switch (formula) {
    case 'young1994':
      return airmassYoung1994(zenithDistance);
    case 'hardie1962':
      return airmassHardie1962(apparentZenithDistance(zenithDistance));
    case 'kastenYoung1989':
      return airmassKastenYoung1989(apparentZenithDistance(zenithDistance));
    case 'pickering2002':
      return airmassPickering2002(apparentZenithDistance(zenithDistance));
    case 'secZ':
      return airmassSecZ(apparentZenithDistance(zenithDistance));
  }
}

/** Airmass from true zenith distance.
 * @param zenithDistance - true, without refraction [deg], 0 ≤ z ≤ 90
 * @returns airmass, 1 at the zenith, 31.7 at the horizon [1]
 * @throws {RangeError} below the horizon, or not finite
 * @accuracy 0.0037 at the horizon, the largest error (from memory of the source)
 * @source Young 1994, Applied Optics 33, 1108 */
export function airmassYoung1994(zenithDistance: number): number {
  const c = Math.cos(requireAboveHorizon(zenithDistance) * radPerDeg);
  const numerator = (1.002432 * c + 0.148386) * c + 0.0096467;
  const denominator = ((c + 0.149864) * c + 0.0102963) * c + 0.000303978;
  return numerator / denominator;
}

/** Airmass from apparent zenith distance, the polynomial of older photoelectric work.
 * @param apparentZenithDistance_deg - through the air [deg], 0 ≤ z ≤ 85
 * @returns airmass [1]
 * @throws {RangeError} beyond 85°, below the horizon, or not finite
 * @accuracy 0.1 % to X = 6.8, 1 % to X = 10
 * @source Hardie 1962, in Astronomical Techniques (ed. Hiltner), p. 180 */
export function airmassHardie1962(apparentZenithDistance_deg: number): number {
  requireAboveHorizon(apparentZenithDistance_deg);
  if (apparentZenithDistance_deg > hardieLimit) {
    throw new RangeError(
      `Hardie's airmass holds to ${hardieLimit}° of zenith distance; at ${apparentZenithDistance_deg.toFixed(2)}° it would be wrong. Use young1994 there.`,
    );
  }
  const s = 1 / Math.cos(apparentZenithDistance_deg * radPerDeg);
  const t = s - 1;
  return s - t * (0.0018167 + t * (0.002875 + t * 0.0008083));
}

/** Airmass from apparent altitude, all the way to the horizon.
 * @param apparentZenithDistance_deg - through the air [deg], 0 ≤ z ≤ 90
 * @returns airmass, 0.9997 at the zenith (sic) [1]
 * @throws {RangeError} below the horizon, or not finite
 * @accuracy 0.5 % at the horizon (from memory of the source)
 * @source Kasten & Young 1989, Applied Optics 28, 4735 */
export function airmassKastenYoung1989(apparentZenithDistance_deg: number): number {
  const altitude = 90 - requireAboveHorizon(apparentZenithDistance_deg);
  return 1 / (Math.sin(altitude * radPerDeg) + 0.50572 * (altitude + 6.07995) ** -1.6364);
}

/** Airmass from apparent altitude, made for extinction close to the horizon.
 * @param apparentZenithDistance_deg - through the air [deg], 0 ≤ z ≤ 90
 * @returns airmass [1]
 * @throws {RangeError} below the horizon, or not finite
 * @accuracy not stated here; 38.7 at the horizon
 * @source Pickering 2002, DIO 12, 1, p. 20, footnote 39 */
export function airmassPickering2002(apparentZenithDistance_deg: number): number {
  const altitude = 90 - requireAboveHorizon(apparentZenithDistance_deg);
  return 1 / Math.sin((altitude + 244 / (165 + 47 * altitude ** 1.1)) * radPerDeg);
}

/** Airmass of a flat atmosphere: the secant of the apparent zenith distance.
 * @param apparentZenithDistance_deg - through the air [deg], 0 ≤ z < 90
 * @returns airmass [1]
 * @throws {RangeError} at or below the horizon, or not finite
 * @accuracy 0.4 % too large at z = 60°, 4 % at 80°, useless near the horizon
 * @source plane-parallel atmosphere */
export function airmassSecZ(apparentZenithDistance_deg: number): number {
  if (requireAboveHorizon(apparentZenithDistance_deg) >= 90) {
    throw new RangeError(
      'The secant of the zenith distance is infinite at the horizon. Use young1994 there.',
    );
  }
  return 1 / Math.cos(apparentZenithDistance_deg * radPerDeg);
}

function requireAboveHorizon(zenithDistance: number): number {
  if (!Number.isFinite(zenithDistance) || zenithDistance < 0) {
    throw new RangeError(
      `Zenith distance must be a finite number of degrees from 0 on, not ${zenithDistance}.`,
    );
  }
  if (zenithDistance > 90) {
    throw new RangeError(
      `No airmass below the horizon: the zenith distance is ${zenithDistance.toFixed(2)}° (altitude ${(90 - zenithDistance).toFixed(2)}°).`,
    );
  }
  return zenithDistance;
}
