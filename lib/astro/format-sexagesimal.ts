/** Positions and clock times for people. Rounded once, as a whole number of the last digit, so 59.9996 becomes 60 and
 * is carried into the minutes instead of being printed. The minus is the keyboard's, so that a copied position can be
 * pasted into any other program. */
import { degPerHour, normaliseRightAscension } from './angles';
import { requireDeclination, requireRange } from './require-range';

/** Right ascension as hours, minutes, seconds.
 * @param ra - any finite angle [deg]
 * @param decimals - digits after the seconds' point, 0 to 6 [1]
 * @returns hh:mm:ss.ss; 23:59:59.9996 with two decimals is 00:00:00.00
 * @throws {RangeError} not finite, or decimals that are not a whole number from 0 to 6
 * @accuracy half of the last digit
 * @source definition */
export function formatRightAscension(ra: number, decimals = 2): string {
  return formatHours(normaliseRightAscension(ra) / degPerHour, decimals);
}

/** Declination as degrees, minutes, seconds, always with its sign.
 * @param dec - declination [deg]
 * @param decimals - digits after the seconds' point, 0 to 6 [1]
 * @returns ±dd:mm:ss.s; what rounds to zero has the sign +
 * @throws {RangeError} not finite, beyond ±90, or decimals that are not a whole number from 0 to 6
 * @accuracy half of the last digit
 * @source definition */
export function formatDeclination(dec: number, decimals = 1): string {
  const perSecond = scaleOf(decimals);
  const units = Math.round(Math.abs(requireDeclination(dec)) * 3600 * perSecond);
  return `${dec < 0 && units > 0 ? '-' : '+'}${inParts(units, decimals)}`;
}

/** Hours of a clock or of sidereal time.
 * @param hours - any finite number of hours; whole days are dropped [h]
 * @param decimals - digits after the seconds' point, 0 to 6 [1]
 * @returns hh:mm:ss, or hh:mm:ss.s with decimals
 * @throws {RangeError} not finite, or decimals that are not a whole number from 0 to 6
 * @accuracy half of the last digit
 * @source definition */
export function formatHours(hours: number, decimals = 0): string {
  const perSecond = scaleOf(decimals);
  const units = Math.round(normaliseRightAscension(hours * degPerHour) * 240 * perSecond);
  return inParts(units % (86_400 * perSecond), decimals);
}

/** Hour angle with its sign, positive west, to the minute or finer.
 * @param hourAngle_hours - −12 < h ≤ 12 [h]
 * @param decimals - digits after the seconds' point, 0 to 6 [1]
 * @returns ±hh:mm:ss; what rounds to zero has the sign +
 * @throws {RangeError} not finite, beyond ±12, or decimals that are not a whole number from 0 to 6
 * @accuracy half of the last digit
 * @source definition */
export function formatHourAngle(hourAngle_hours: number, decimals = 0): string {
  requireRange(hourAngle_hours, { name: 'Hour angle', unit: 'hours', min: -12, max: 12 });
  const units = Math.round(Math.abs(hourAngle_hours) * 3600 * scaleOf(decimals));
  return `${hourAngle_hours < 0 && units > 0 ? '-' : '+'}${inParts(units, decimals)}`;
}

function scaleOf(decimals: number): number {
  if (!Number.isInteger(decimals) || decimals < 0 || decimals > 6) {
    throw new RangeError(`Seconds are printed with 0 to 6 decimals, not ${decimals}.`);
  }
  return 10 ** decimals;
}

/** Whole units of the last digit → two digits each of hours (or degrees), minutes, seconds. */
function inParts(units: number, decimals: number): string {
  const perSecond = 10 ** decimals;
  const wholeSeconds = Math.floor(units / perSecond);
  const two = (value: number) => String(value).padStart(2, '0');
  const clock = [Math.floor(wholeSeconds / 3600), Math.floor(wholeSeconds / 60) % 60, wholeSeconds % 60].map(
    two,
  );
  if (decimals === 0) return clock.join(':');
  return `${clock.join(':')}.${String(units % perSecond).padStart(decimals, '0')}`;
}
