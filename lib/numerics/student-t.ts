/**
 * Student's t distribution: its tail and its quantiles, by the regularised incomplete beta function.
 *
 * | symbol | name | what it is |
 * |---|---|---|
 * | ν | dof | degrees of freedom, > 0; Infinity is the normal distribution |
 * | I_x(a, b) | regularised incomplete beta | P(|T| > t) = I_x(ν/2, 1/2), x = ν / (ν + t²) |
 */

/** Beyond this the normal distribution is the same to 1e-5. [1] */
const manyDegrees = 1e5;

function logGamma(x: number): number {
  // Lanczos's approximation, g = 7, nine terms.
  const c = [
    0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
    12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
  ];
  const y = x - 1;
  let sum = c[0]!;
  for (let k = 1; k < 9; k += 1) sum += c[k]! / (y + k);
  const t = y + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (y + 0.5) * Math.log(t) - t + Math.log(sum);
}

/** Continued fraction of the incomplete beta function by Lentz's method. */
function betaFraction(a: number, b: number, x: number): number {
  const tiny = 1e-300;
  let c = 1;
  let d = 1 / (1 - ((a + b) * x) / (a + 1) || tiny);
  let result = d;
  for (let m = 1; m <= 2000; m += 1) {
    for (const factor of [
      (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m)),
      (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1)),
    ]) {
      d = 1 / (1 + factor * d || tiny);
      c = 1 + factor / c || tiny;
      result *= d * c;
    }
    if (Math.abs(d * c - 1) < 1e-15) break;
  }
  return result;
}

function incompleteBeta(a: number, b: number, x: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x));
  if (x < (a + 1) / (a + b + 2)) return (front * betaFraction(a, b, x)) / a;
  return 1 - (front * betaFraction(b, a, 1 - x)) / b;
}

/** Probability of a deviate beyond ±t.
 * @param t - deviate [1]
 * @param dof - degrees of freedom, > 0 or Infinity [1]
 * @returns P(|T| > |t|) [1]
 * @accuracy 1e-10 relative up to 1e5 degrees of freedom, 1e-4 beyond
 * @source Abramowitz and Stegun 1964, Handbook of Mathematical Functions, 26.7.1 and 26.5.8 */
export function studentTTail(t: number, dof: number): number {
  const nu = Math.min(dof, manyDegrees);
  return incompleteBeta(nu / 2, 0.5, nu / (nu + t * t));
}

/** The deviate beyond which, on both sides together, a given probability lies.
 * @param tail - probability, 0 < tail < 1 [1]
 * @param dof - degrees of freedom, > 0 or Infinity [1]
 * @returns t with P(|T| > t) = tail [1]
 * @accuracy 1e-10 relative
 * @source inversion of studentTTail by bisection */
export function studentTLimit(tail: number, dof: number): number {
  let low = 0;
  let high = 1;
  while (studentTTail(high, dof) > tail && high < 1e300) high *= 2;
  for (let step = 0; step < 200 && high - low > 1e-12 * high; step += 1) {
    const mid = (low + high) / 2;
    if (studentTTail(mid, dof) > tail) low = mid;
    else high = mid;
  }
  return (low + high) / 2;
}
