/**
 * Sums of products as if computed with twice the digits.
 */

/** 2^27 + 1 splits a number into two halves of 26 bits. [1] */
const splitter = 134217729;

/** Σ a_i b_i, rounded once from a sum that carries twice the digits.
 * @param a - shape (n), below 1e300 in size [any]
 * @param b - shape (n), below 1e300 in size [any]
 * @returns the sum [any]
 * @accuracy relative error one rounding, plus condition of the sum × rounding²
 * @source Ogita, Rump and Oishi 2005, SIAM Journal on Scientific Computing 26, 1955, algorithm Dot2; products split as in
 * Dekker 1971, Numerische Mathematik 18, 224 */
export function dotTwice(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < a.length; i += 1) {
    const x = a[i]!;
    const y = b[i]!;
    const product = x * y;
    const xBig = splitter * x;
    const xHigh = xBig - (xBig - x);
    const xLow = x - xHigh;
    const yBig = splitter * y;
    const yHigh = yBig - (yBig - y);
    const yLow = y - yHigh;
    const productLost = xLow * yLow - (product - xHigh * yHigh - xLow * yHigh - xHigh * yLow);
    const next = sum + product;
    const part = next - sum;
    const sumLost = sum - (next - part) + (product - part);
    sum = next;
    lost += productLost + sumLost;
  }
  return sum + lost;
}
