/** Angles on the circle: wrapping, and the two factors that everything else multiplies by. */

/** Radians per degree. [rad/deg] @source definition */
export const radPerDeg = Math.PI / 180;
/** Degrees per radian. [deg/rad] @source definition */
export const degPerRad = 180 / Math.PI;
/** Degrees of rotation per hour of right ascension or hour angle. [deg/h] @source definition */
export const degPerHour = 15;

/** Brings a right ascension into one turn.
 * @param ra - any finite angle [deg]
 * @returns the same direction, 0 ≤ ra < 360 [deg]
 * @throws {RangeError} when not finite
 * @accuracy exact but for rounding
 * @source definition */
export function normaliseRightAscension(ra: number): number {
  if (!Number.isFinite(ra))
    throw new RangeError(`Right ascension must be a finite number of degrees, not ${ra}.`);
  const turned = ra % 360;
  const positive = turned < 0 ? turned + 360 : turned;
  // A tiny negative angle plus 360 rounds to 360 itself; −0 would print as a negative angle.
  return positive >= 360 || positive === 0 ? 0 : positive;
}

/** Brings hours of rotation into one turn, for clocks and sidereal time.
 * @param hours - any finite number of hours [h]
 * @returns the same rotation, 0 ≤ hours < 24 [h]
 * @throws {RangeError} when not finite
 * @accuracy exact but for rounding
 * @source definition */
export function normaliseHours(hours: number): number {
  return normaliseRightAscension(hours * degPerHour) / degPerHour;
}

/** Brings an hour angle to the shorter way round.
 * @param hours - any finite number of hours [h]
 * @returns the same rotation, −12 < hours ≤ 12, positive west of the meridian [h]
 * @throws {RangeError} when not finite
 * @accuracy exact but for rounding
 * @source definition */
export function wrapHourAngle(hours: number): number {
  const turned = normaliseHours(hours);
  return turned > 12 ? turned - 24 : turned;
}
