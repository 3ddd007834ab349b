/**
 * Magnitude and colours of one star from all its measurements of a night. With y = m_inst − Z − k1·X − tau·t − kappa·t·X
 * a measurement in band b says
 *
 *     y = a_b·theta + (T + k2·X)·C_b + T2·C_b²
 *
 * | symbol | name | shape | meaning |
 * |---|---|---|---|
 * | theta | theta | (5) | V, B−V, U−B, V−R, V−I [mag] |
 * | a_b | magnitudeRows | (5, 5) | which of them make up the magnitude in band b |
 * | C_b | colourPlace | (5) | which of them is the colour of band b |
 * | w | weight | – | 1 / variance of a measurement [mag⁻²] |
 * | m | moments | (5, nMoments) | sums per band of w, w·X, w·X², w·t, w·X·t, w·X²·t, w·y, w·X·y |
 *
 * The row of a measurement in the linearised equations is u + X·v, with u = a_b + (T + 2·T2·C)·e_C and v = k2·e_C, so a
 * band's measurements enter through their moments alone. The normal equations have at most five unknowns and columns
 * near unit length (colour terms are small), so forming them costs two of the sixteen digits; without T2 they are exact
 * at the first step, with it they are repeated (Gauss and Newton).
 */
import { nBands } from './bands';
import type { BandTerms } from './frame-constants';

export const moment = { w: 0, wX: 1, wXX: 2, wt: 3, wXt: 4, wXXt: 5, wy: 6, wXy: 7 } as const;
export const nMoments = 8;
const n = nBands;

/** Rows U, B, V, R, I; columns V, B−V, U−B, V−R, V−I. */
const magnitudeRows = Float64Array.of(
  ...[1, 1, 1, 0, 0],
  ...[1, 1, 0, 0, 0],
  ...[1, 0, 0, 0, 0],
  ...[1, 0, 0, -1, 0],
  ...[1, 0, 0, 0, -1],
);
/** Place in theta of the colour of each band. */
export const colourPlace = Uint8Array.of(2, 1, 1, 3, 4);
/** Place of B−V in theta: the colour that can be assumed. */
export const assumedPlace = 1;

/** A change of theta below which the iteration for T2 ends [mag], and the steps after which it is given up. */
const tolerance = 1e-10;
const maxSteps = 30;
/** What a pivot must keep of its diagonal; less means that the colour terms cancel the colour itself. Our own rule. */
const smallestPivot = 1e-9;

/** Everything that the equations of one star need, made once and used for all stars. */
export interface StarEquations {
  readonly terms: readonly (BandTerms | undefined)[];
  readonly moments: Float64Array;
  /** 1 for bands whose moments count, shape (5). */
  readonly isUsed: Uint8Array;
  /** 1 for elements of theta that are sought; the others stay as they are, shape (5). */
  readonly isSought: Uint8Array;
  readonly theta: Float64Array;
  /** Inverse of the normal matrix: covariance of theta by random errors, shape (5, 5) [mag²]. */
  readonly inverse: Float64Array;
  readonly normal: Float64Array;
  readonly right: Float64Array;
  readonly u: Float64Array;
  readonly direction: Float64Array;
  readonly sums: Float64Array;
}

/** Room for the equations of a star.
 * @param terms - calibrations by place of band, shape (5 bands)
 * @returns equations without measurements
 * @accuracy exact
 * @source definition of this program */
export function starEquations(terms: readonly (BandTerms | undefined)[]): StarEquations {
  return {
    terms,
    moments: new Float64Array(n * nMoments),
    isUsed: new Uint8Array(n),
    isSought: new Uint8Array(n),
    theta: new Float64Array(n),
    inverse: new Float64Array(n * n),
    normal: new Float64Array(n * n),
    right: new Float64Array(n),
    u: new Float64Array(n),
    direction: new Float64Array(n),
    sums: new Float64Array(7),
  };
}

/** Finds theta and its covariance by random errors, in place.
 * @param equations - with moments, what is used and what is sought; theta holds what is assumed and zero elsewhere
 * @returns whether there is a solution: false where the equations are singular or the iteration does not converge
 * @accuracy 1e-10 mag for the iteration with T2, rounding without it
 * @source Gauss 1809, Theoria motus, book 2, section 3; equations: design of this program */
export function solveStar(equations: StarEquations): boolean {
  const { terms, isUsed, theta, right } = equations;
  let isQuadratic = false;
  for (let b = 0; b < n; b += 1) {
    if (isUsed[b] === 1 && terms[b]!.coefficients.colourTerm2 !== 0) isQuadratic = true;
  }
  for (let step = 0; step < maxSteps; step += 1) {
    formNormal(equations);
    if (!invertNormal(equations)) return false;
    let change = 0;
    for (let i = 0; i < n; i += 1) {
      let delta = 0;
      for (let j = 0; j < n; j += 1) delta += equations.inverse[i * n + j]! * right[j]!;
      theta[i]! += delta;
      change = Math.max(change, Math.abs(delta));
    }
    if (!Number.isFinite(change)) return false;
    if (!isQuadratic || change <= tolerance) return true;
  }
  return false;
}

/** Normal matrix and right side of the step from the present theta. */
function formNormal({ terms, moments, isUsed, isSought, theta, normal, right, u }: StarEquations): void {
  normal.fill(0);
  right.fill(0);
  for (let b = 0; b < n; b += 1) {
    if (isUsed[b] === 0) continue;
    const { colourTerm: T, secondOrderExtinction: k2, colourTerm2: T2 } = terms[b]!.coefficients;
    const c = colourPlace[b]!;
    const C = theta[c]!;
    let magnitude = 0;
    for (let i = 0; i < n; i += 1) {
      u[i] = magnitudeRows[b * n + i]!;
      magnitude += u[i]! * theta[i]!;
    }
    u[c]! += T + 2 * T2 * C;
    const m = b * nMoments;
    const [w, wX, wXX] = [moments[m]!, moments[m + 1]!, moments[m + 2]!];
    const constant = magnitude + (T + T2 * C) * C;
    const left0 = moments[m + moment.wy]! - constant * w - k2 * C * wX;
    const left1 = moments[m + moment.wXy]! - constant * wX - k2 * C * wXX;
    for (let i = 0; i < n; i += 1) {
      const vi = i === c ? k2 : 0;
      if (isSought[i] === 0) continue;
      right[i]! += u[i]! * left0 + vi * left1;
      for (let j = 0; j <= i; j += 1) {
        if (isSought[j] === 0) continue;
        const vj = j === c ? k2 : 0;
        normal[i * n + j]! += u[i]! * u[j]! * w + (u[i]! * vj + vi * u[j]!) * wX + vi * vj * wXX;
      }
    }
  }
}

/** Inverse by Cholesky factors, on what is sought; zero elsewhere. Overwrites `normal`. */
function invertNormal({ isSought, normal: L, inverse, direction: x }: StarEquations): boolean {
  for (let i = 0; i < n; i += 1) {
    if (isSought[i] === 0) L[i * n + i] = 1;
    for (let j = 0; j <= i; j += 1) {
      const whole = L[i * n + j]!;
      let sum = whole;
      for (let k = 0; k < j; k += 1) sum -= L[i * n + k]! * L[j * n + k]!;
      if (j < i) L[i * n + j] = sum / L[j * n + j]!;
      else if (sum > smallestPivot * whole) L[i * n + i] = Math.sqrt(sum);
      else return false;
    }
  }
  for (let column = 0; column < n; column += 1) {
    x.fill(0);
    x[column] = isSought[column]!;
    for (let i = column; i < n; i += 1) {
      for (let k = column; k < i; k += 1) x[i]! -= L[i * n + k]! * x[k]!;
      x[i]! /= L[i * n + i]!;
    }
    for (let i = n - 1; i >= 0; i -= 1) {
      for (let k = i + 1; k < n; k += 1) x[i]! -= L[k * n + i]! * x[k]!;
      x[i]! /= L[i * n + i]!;
      inverse[i * n + column] = x[i]!;
    }
  }
  return true;
}

/** Variances of a linear combination g·theta: by random errors, and by the coefficients and the assumed colour.
 * @param equations - after solveStar
 * @param gradient - g, shape (5) [1]
 * @param assumedErr - standard error of the assumed B−V, 0 where none is assumed [mag]
 * @param variances - random and systematic are written here, shape (2) [mag²]
 * @accuracy first order in the coefficients' errors; what residuals of the star contribute to the derivative is left out,
 * being smaller by their size in magnitudes
 * @source propagation of error through the normal equations: common practice, no source */
export function starVariances(
  equations: StarEquations,
  gradient: ArrayLike<number>,
  assumedErr: number,
  variances: Float64Array,
): void {
  const { terms, isUsed, inverse, direction } = equations;
  let random = 0;
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += inverse[i * n + j]! * gradient[j]!;
    direction[i] = sum;
    random += gradient[i]! * sum;
  }
  let systematic = 0;
  let perColour = gradient[assumedPlace]!;
  for (let b = 0; b < n; b += 1) {
    if (isUsed[b] === 0) continue;
    systematic += coefficientVariance(equations, b, terms[b]!.covariance);
    perColour -= colourSensitivity(equations, b);
  }
  variances[0] = random;
  variances[1] = systematic + (assumedErr === 0 ? 0 : (perColour * assumedErr) ** 2);
}

/** How much a measurement of this band moves g·theta: alpha + beta·X times its weight. */
function influence({ terms, theta, direction }: StarEquations, b: number): readonly [number, number] {
  const { colourTerm, secondOrderExtinction, colourTerm2 } = terms[b]!.coefficients;
  const c = colourPlace[b]!;
  let alpha = (colourTerm + 2 * colourTerm2 * theta[c]!) * direction[c]!;
  for (let i = 0; i < n; i += 1) alpha += magnitudeRows[b * n + i]! * direction[i]!;
  return [alpha, secondOrderExtinction * direction[c]!];
}

/** Variance by the coefficients of one band: s′·covariance·s with s the derivative by each, in coefficientOrder. */
function coefficientVariance(equations: StarEquations, b: number, covariance: Float64Array): number {
  const { moments, theta, sums: s } = equations;
  const [alpha, beta] = influence(equations, b);
  const C = theta[colourPlace[b]!]!;
  const m = b * nMoments;
  s[0] = alpha * moments[m + moment.w]! + beta * moments[m + moment.wX]!;
  s[1] = alpha * moments[m + moment.wX]! + beta * moments[m + moment.wXX]!;
  s[2] = C * s[0];
  s[3] = C * s[1];
  s[4] = alpha * moments[m + moment.wt]! + beta * moments[m + moment.wXt]!;
  s[5] = alpha * moments[m + moment.wXt]! + beta * moments[m + moment.wXXt]!;
  s[6] = C * s[2];
  let variance = 0;
  for (let i = 0; i < 7; i += 1) {
    for (let j = 0; j < 7; j += 1) variance += s[i]! * covariance[i * 7 + j]! * s[j]!;
  }
  return variance;
}

/** How much g·theta falls through this band when B−V is assumed redder by one. */
function colourSensitivity(equations: StarEquations, b: number): number {
  const { terms, moments, theta } = equations;
  const { colourTerm, secondOrderExtinction, colourTerm2 } = terms[b]!.coefficients;
  const [alpha, beta] = influence(equations, b);
  const isColour = colourPlace[b] === assumedPlace;
  const m = b * nMoments;
  const [w, wX, wXX] = [moments[m]!, moments[m + 1]!, moments[m + 2]!];
  const constant =
    magnitudeRows[b * n + assumedPlace]! +
    (isColour ? colourTerm + 2 * colourTerm2 * theta[assumedPlace]! : 0);
  const perAirmass = isColour ? secondOrderExtinction : 0;
  return alpha * (constant * w + perAirmass * wX) + beta * (constant * wX + perAirmass * wXX);
}
