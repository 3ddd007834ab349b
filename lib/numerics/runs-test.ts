/**
 * Whether signs follow each other by chance: the number of runs of equal signs, given how many of each there are.
 */
import { studentTLimit } from './student-t';

export interface RunsTest {
  readonly positive: number;
  readonly negative: number;
  /** Runs of equal signs. */
  readonly runs: number;
  /** Probability of so few runs or fewer: small where neighbours are alike, as under a drift. */
  readonly probabilityOfFewer: number;
  /** Probability of so many runs or more: small where neighbours alternate. */
  readonly probabilityOfMore: number;
  /** Normal deviate of the smaller of these probabilities, negative where there are few runs [1]. */
  readonly deviate: number;
}

/** What is less is rounding: a deviate of 37. [1] */
const leastProbability = 1e-300;

const deviateOf = (probability: number): number =>
  studentTLimit(Math.min(1, Math.max(leastProbability, 2 * probability)), Infinity);

/** Runs of the signs of values in their order; zeros are left out.
 * @param values - in order, of time for instance, shape (n) [any]
 * @returns runs, their exact probabilities and the normal deviate of these; 1, 1 and 0 where only one sign, or none, occurs
 * @accuracy 1e-10, exact distribution
 * @source Wald and Wolfowitz 1940, Annals of Mathematical Statistics 11, 147 */
export function runsTest(values: ArrayLike<number>): RunsTest {
  const signs = Array.from(values, Math.sign).filter((sign) => sign !== 0);
  const positive = signs.filter((sign) => sign > 0).length;
  const negative = signs.length - positive;
  const runs = signs.reduce((count, sign, i) => count + Number(i === 0 || sign !== signs[i - 1]), 0);
  if (positive === 0 || negative === 0) {
    return { positive, negative, runs, probabilityOfFewer: 1, probabilityOfMore: 1, deviate: 0 };
  }
  const logFactorial = new Float64Array(signs.length + 1);
  for (let k = 2; k <= signs.length; k += 1) logFactorial[k] = logFactorial[k - 1]! + Math.log(k);
  const choose = (n: number, k: number): number =>
    k < 0 || k > n ? -Infinity : logFactorial[n]! - logFactorial[k]! - logFactorial[n - k]!;
  const all = choose(signs.length, positive);
  // m runs: of each sign half of them, or one more of the one that begins and ends.
  const probability = (m: number): number => {
    const half = m >> 1;
    const pick = (a: number, b: number): number =>
      Math.exp(choose(positive - 1, a) + choose(negative - 1, b) - all);
    return m % 2 === 0 ? 2 * pick(half - 1, half - 1) : pick(half, half - 1) + pick(half - 1, half);
  };
  let fewer = 0;
  for (let m = 2; m <= runs; m += 1) fewer += probability(m);
  const probabilityOfMore = Math.min(1, Math.max(0, 1 - fewer + probability(runs)));
  const probabilityOfFewer = Math.min(1, fewer);
  const deviate =
    probabilityOfFewer < probabilityOfMore ? -deviateOf(probabilityOfFewer) : deviateOf(probabilityOfMore);
  return { positive, negative, runs, probabilityOfFewer, probabilityOfMore, deviate };
}
