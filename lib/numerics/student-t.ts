/**
 * Student's t distribution for any real number of degrees of freedom, as intervals of estimated variances need it.
 * P(|T| > t) = I_x(ν/2, ½) with x = ν / (ν + t²), I the regularised incomplete beta function.
 */
import { normalBeyond } from './normal-distribution';

/** From here on t and normal agree to 1e-11. [1] */
const asNormal = 1e12;

/** log Γ(x). Lanczos' series with g = 7 and nine terms. */
function logGamma(x: number): number {
  const terms = [
    0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
    12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
  ];
  let sum = terms[0]!;
  for (let k = 1; k < terms.length; k += 1) sum += terms[k]! / (x - 1 + k);
  const t = x + 6.5;
  return 0.5 * Math.log(2 * Math.PI) + (x - 0.5) * Math.log(t) - t + Math.log(sum);
}

/** The continued fraction of the incomplete beta function, quick for x below (a + 1) / (a + b + 2). */
function betaFraction(x: number, a: number, b: number): number {
  const tiny = 1e-300;
  let c = 1;
  let d = 1 / (1 - ((a + b) * x) / (a + 1) || tiny);
  let value = d;
  for (let m = 1; m < 10_000; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / (1 + even * d || tiny);
    c = 1 + even / c || tiny;
    value *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / (1 + odd * d || tiny);
    c = 1 + odd / c || tiny;
    value *= d * c;
    if (Math.abs(d * c - 1) < 1e-16) break;
  }
  return value;
}

/** log Γ(a + ½) − log Γ(a), which for large a is the small difference of two large numbers. */
function logGammaStep(a: number): number {
  if (a < 50) return logGamma(a + 0.5) - logGamma(a);
  return 0.5 * Math.log(a) - 1 / (8 * a) + 1 / (192 * a ** 3) - 1 / (640 * a ** 5);
}

/** Probability of a deviate beyond ±t.
 * @param t - deviate, of either sign [1]
 * @param dof - degrees of freedom ν > 0, not necessarily whole; Infinity for the normal distribution [1]
 * @returns P(|T| > |t|), 0 … 1 [1]
 * @throws {RangeError} when t is not a number or there is no degree of freedom
 * @accuracy 1e-9 relative, far out too
 * @source Abramowitz and Stegun 1964, Handbook of Mathematical Functions, 26.7.1 and 26.5.8; Lentz 1976, Applied Optics
 * 15, 668 (continued fraction) */
export function studentTTail(t: number, dof: number): number {
  if (Number.isNaN(t)) throw new RangeError('A deviate is a number.');
  if (!(dof > 0)) throw new RangeError(`A t distribution has more than 0 degrees of freedom, not ${dof}.`);
  const size = Math.abs(t);
  if (dof >= asNormal) return 2 * normalBeyond(size);
  if (size === 0) return 1;
  if (size === Infinity) return 0;
  const a = dof / 2;
  const ratio = (size * size) / dof;
  const x = 1 / (1 + ratio);
  const rest = ratio / (1 + ratio);
  // x^a (1 − x)^½ / B(a, ½).
  const front = Math.exp(
    -a * Math.log1p(ratio) + 0.5 * Math.log(rest) + logGammaStep(a) - 0.5 * Math.log(Math.PI),
  );
  return x < (a + 1) / (a + 2.5)
    ? (front * betaFraction(x, a, 0.5)) / a
    : 1 - (front * betaFraction(rest, 0.5, a)) / 0.5;
}

/** The deviate beyond which, on both sides together, a given probability lies: 0.05 for an interval of 95 %.
 * @param tail - probability, 0 < tail ≤ 1 [1]
 * @param dof - degrees of freedom ν > 0, not necessarily whole; Infinity for the normal distribution [1]
 * @returns t with P(|T| > t) = tail, the half width of the interval in standard errors [1]
 * @throws {RangeError} when tail or degrees are out of range
 * @accuracy 1e-9 relative for tails of 1e-9 … 0.9, against closed forms and scipy
 * @source Abramowitz and Stegun 1964, Handbook of Mathematical Functions, 26.7; found by bisection */
export function studentTLimit(tail: number, dof: number): number {
  if (!(tail > 0 && tail <= 1)) throw new RangeError(`A tail holds more than 0 and at most 1, not ${tail}.`);
  let low = 0;
  let high = 1;
  while (studentTTail(high, dof) > tail && high < 1e150) {
    low = high;
    high *= 2;
  }
  for (let step = 0; step < 200 && high - low > 1e-15 * high; step += 1) {
    const middle = (low + high) / 2;
    if (studentTTail(middle, dof) > tail) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
