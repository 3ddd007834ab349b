/** Where the series has more terms than the continued fraction. [1] */
const seriesLimit = 2.5;

/** Probability that a standard normal deviate exceeds x.
 * @param x - ≥ 0 [1]
 * @returns P(X > x), 0 … ½ [1]
 * @throws {RangeError} when x is negative or not a number
 * @accuracy 1e-14 relative below 2.5, 1e-13 beyond
 * @source Abramowitz and Stegun 1964, Handbook of Mathematical Functions, 26.2.11 (series) and 26.2.14 (continued
 * fraction) */
export function normalBeyond(x: number): number {
  if (!(x >= 0)) throw new RangeError(`The tail begins at 0 or more, not at ${x}.`);
  if (x > 40) return 0;
  const density = Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);
  if (x < seriesLimit) {
    let term = x;
    let sum = x;
    for (let k = 3; term > 1e-17 * sum; k += 2) {
      term *= (x * x) / k;
      sum += term;
    }
    return 0.5 - density * sum;
  }
  let fraction = x;
  for (let k = 200; k > 0; k -= 1) fraction = x + k / fraction;
  return density / fraction;
}
