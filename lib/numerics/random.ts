/**
 * Reproducible random numbers: the generator xoshiro128** with 32-bit words, which has period 2^128 − 1 and the same
 * values on every machine. Nothing in the science code draws from anywhere else.
 *
 * | symbol | name | meaning |
 * |---|---|---|
 * | s | state | four 32-bit words, not all zero |
 *
 * Not for secrets: the state can be found from a few values.
 */

/** A stream of random numbers. Each call advances it. */
export interface Random {
  /** An integer, 0 … 2^32 − 1, all equally likely. */
  readonly word: () => number;
  /** A number in the half-open interval 0 … 1, in steps of 2^−53. */
  readonly uniform: () => number;
  /** A normal deviate of mean 0 and standard deviation 1. */
  readonly normal: () => number;
}

const rotate = (word: number, bits: number): number => (word << bits) | (word >>> (32 - bits));

/** Words that are well mixed even for seeds such as 0, 1, 2 (the finaliser of MurmurHash3 on a Weyl sequence). */
function expandSeed(seed: number, stream: number): Uint32Array {
  const state = new Uint32Array(4);
  let weyl = (Math.imul(seed, 0x85ebca6b) ^ Math.imul(stream + 1, 0xc2b2ae35)) | 0;
  for (let i = 0; i < 4; i += 1) {
    weyl = (weyl + 0x9e3779b9) | 0;
    let word = weyl ^ seed;
    word = Math.imul(word ^ (word >>> 16), 0x85ebca6b);
    word = Math.imul(word ^ (word >>> 13), 0xc2b2ae35);
    state[i] = word ^ (word >>> 16);
  }
  return state;
}

/** The generator itself, from its state; `state` is not changed.
 * @param state - four 32-bit words, not all zero, shape (4) [1]
 * @returns a function that gives the next word, 0 … 2^32 − 1 [1]
 * @throws {RangeError} when the state does not have four words or is all zero, from which the generator cannot leave
 * @accuracy equal to the published C program word for word
 * @source Blackman and Vigna 2021, ACM Transactions on Mathematical Software 47, 36: xoshiro128** 1.1 */
export function xoshiro128(state: Uint32Array): () => number {
  if (state.length !== 4 || state.every((word) => word === 0)) {
    throw new RangeError('The state of xoshiro128** is four words, not all zero.');
  }
  let [s0, s1, s2, s3] = state as unknown as [number, number, number, number];
  return () => {
    const result = Math.imul(rotate(Math.imul(s1, 5), 7), 9) >>> 0;
    const shifted = s1 << 9;
    s2 ^= s0;
    s3 ^= s1;
    s1 ^= s2;
    s0 ^= s3;
    s2 ^= shifted;
    s3 = rotate(s3, 11);
    return result;
  };
}

/** A stream of random numbers that the seed determines. Streams of one seed are independent for all practical
 * purposes, so that one part of a simulation can change without moving the numbers of the others.
 * @param seed - an integer, −2^31 … 2^32 − 1 [1]
 * @param stream - which stream of this seed, an integer ≥ 0 [1]
 * @returns the stream, at its beginning
 * @throws {RangeError} when seed or stream is not an integer within its range
 * @accuracy normal deviates: mean 0, variance 1, kurtosis 3 within their standard errors over 10^6 draws
 * @source generator: see xoshiro128. Normal deviates: Marsaglia and Bray 1964, SIAM Review 6, 260 (polar method).
 * Seeding: common practice, no source */
export function createRandom(seed: number, stream = 0): Random {
  if (!Number.isInteger(seed) || seed < -(2 ** 31) || seed >= 2 ** 32) {
    throw new RangeError(`A seed is an integer of 32 bits, not ${seed}.`);
  }
  if (!Number.isInteger(stream) || stream < 0)
    throw new RangeError(`A stream is an integer ≥ 0, not ${stream}.`);
  const word = xoshiro128(expandSeed(seed, stream));
  const uniform = (): number => ((word() >>> 5) * 2 ** 26 + (word() >>> 6)) * 2 ** -53;
  // The polar method makes two deviates at once; the second waits for the next call.
  let waiting: number | null = null;
  const normal = (): number => {
    if (waiting !== null) {
      const value = waiting;
      waiting = null;
      return value;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const square = x * x + y * y;
      if (square > 0 && square < 1) {
        const factor = Math.sqrt((-2 * Math.log(square)) / square);
        waiting = y * factor;
        return x * factor;
      }
    }
  };
  return { word, uniform, normal };
}
