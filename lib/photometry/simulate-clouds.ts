import type { Random } from '@/lib/numerics/random';

/** A bank of cloud that passes: grey extinction that rises and falls, uneven from frame to frame. */
export interface CloudEpisode {
  /** Hours, on the scale of the frames. */
  readonly from_hours: number;
  readonly to_hours: number;
  /** Extinction in the middle [mag]. */
  readonly depth: number;
  /** Unevenness, as a fraction of the extinction at that moment. */
  readonly unevenness: number;
}

/** Extinction by clouds on each frame. It is never negative: a cloud does not brighten a star.
 * @param hours - mid-exposures, shape (n frames) [h]
 * @param episodes - what passed
 * @param random - one draw per frame and episode
 * @returns extinction, shape (n frames) [mag]
 * @throws {RangeError} when an episode ends before it begins, or its depth or unevenness is negative
 * @accuracy a shape for tests and demonstrations (raised cosine), not a model of real clouds
 * @source common practice, no source */
export function cloudOffsets(
  hours: Float64Array,
  episodes: readonly CloudEpisode[],
  random: Random,
): Float64Array {
  const offsets = new Float64Array(hours.length);
  for (const { from_hours, to_hours, depth, unevenness } of episodes) {
    if (!(to_hours > from_hours) || !(depth >= 0) || !(unevenness >= 0)) {
      throw new RangeError(
        'A cloud episode ends after it begins, and its depth and unevenness are not negative.',
      );
    }
    for (let f = 0; f < hours.length; f += 1) {
      const deviate = random.normal();
      const phase = (hours[f]! - from_hours) / (to_hours - from_hours);
      if (phase < 0 || phase > 1) continue;
      const mean = depth * 0.5 * (1 - Math.cos(2 * Math.PI * phase));
      offsets[f]! += Math.max(0, mean * (1 + unevenness * deviate));
    }
  }
  return offsets;
}
