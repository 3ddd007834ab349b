import { radPerDeg } from './angles';
import { requireRange } from './require-range';

/** Lifting of a star by the air, from its true altitude; 1010 hPa, 10 °C.
 * @param altitude - true, without refraction [deg], −2 to 90
 * @returns refraction to add to the true altitude, never negative [deg]
 * @throws {RangeError} not finite, above the zenith, or more than 2° below the horizon, where the formula has no sense
 * @accuracy 0.1 arcmin above 5°, worse near the horizon, where the day's air matters more than the formula; at a
 *   mountain site the true value is smaller by the ratio of the pressures (a quarter at 2,300 m)
 * @source Saemundsson 1986, Sky & Telescope 72, 70; set to 0 near the zenith, where the formula turns negative */
export function refraction(altitude: number): number {
  requireRange(altitude, { name: 'True altitude', unit: 'degrees', min: -2, max: 90 });
  const argument = altitude + 10.3 / (altitude + 5.11);
  return Math.max(0, 1.02 / 60 / Math.tan(argument * radPerDeg));
}

/** Zenith distance at which a star is seen through the air.
 * @param zenithDistance - true, without refraction [deg], 0 to 92
 * @returns apparent zenith distance [deg]
 * @throws {RangeError} not finite, negative, or more than 2° below the horizon
 * @accuracy as refraction
 * @source Saemundsson 1986, Sky & Telescope 72, 70 */
export function apparentZenithDistance(zenithDistance: number): number {
  requireRange(zenithDistance, { name: 'True zenith distance', unit: 'degrees', min: 0, max: 92 });
  return zenithDistance - refraction(90 - zenithDistance);
}
