/**
 * A first idea of which rows of a night belong together, found without trusting any of them: least trimmed squares from
 * many small random samples, then Tukey's bisquare (lib/numerics/least-trimmed-squares, lib/numerics/robust).
 *
 * Rows are divided by √(a² + u²), a being what is known of their errors and u the scatter of a good night, so that a
 * bright star does not outweigh all others before the scatter of this night is known; the robust scale then says how
 * many of these the rows really scatter. Values known beforehand enter as rows that are in every sample.
 *
 * Breakdown: half of the rows, less what determines the coefficients.
 */
import { type Prior } from '@/lib/numerics/generalised-least-squares';
import { fitTrimmed } from '@/lib/numerics/least-trimmed-squares';
import { createRandom } from '@/lib/numerics/random';
import { fitRobust } from '@/lib/numerics/robust';

export interface StartInput {
  /** Column-major, shape (n, p). */
  readonly design: Float64Array;
  readonly columns: number;
  readonly response: Float64Array;
  /** a: known error of each row, shape (n) [mag]. */
  readonly rowSigma: Float64Array;
  readonly priors: readonly Prior[];
  /** Tuning constant of the bisquare [its scale]. */
  readonly bisquare: number;
  readonly seed: number;
}

export interface RobustStart {
  readonly coefficients: Float64Array;
  /** Residuals in units of their robust scale, shape (n) [1]. */
  readonly standardised: Float64Array;
  /** Of the bisquare, 0 … 1, shape (n) [1]. */
  readonly weights: Float64Array;
}

/** u [mag]; common practice, no source */
const goodScatter = 0.01;
/** So many samples are drawn that, were two rows in five wrong, one sample were good but for this chance. Our own rule. */
const missedChance = 1e-6;
const goodShare = 0.6;

/** Finds which rows belong together.
 * @param input - design, response, errors, priors, tuning constant and seed
 * @returns coefficients, residuals and weights; null where the rows do not determine the coefficients
 * @accuracy deterministic for a seed; later steps do not rest on its last digits
 * @source Rousseeuw and Van Driessen 2006, Data Mining and Knowledge Discovery 12, 29; Beaton and Tukey 1974,
 * Technometrics 16, 147 */
export function startRobustly(input: StartInput): RobustStart | null {
  const { design, columns, response, rowSigma, priors, bisquare, seed } = input;
  const n = response.length;
  const all = n + priors.length;
  const errors = rowSigma.map((a) => Math.hypot(a, goodScatter));
  const scaled = new Float64Array(all * columns);
  const right = new Float64Array(all);
  const anchored = new Uint8Array(all).fill(1, n);
  for (let i = 0; i < n; i += 1) {
    right[i] = response[i]! / errors[i]!;
    for (let j = 0; j < columns; j += 1) scaled[j * all + i] = design[j * n + i]! / errors[i]!;
  }
  for (const [k, { column, value, sigma }] of priors.entries()) {
    right[n + k] = value / sigma;
    scaled[column * all + n + k] = 1 / sigma;
  }
  const rows = { design: scaled, columns, response: right, anchored };
  const trimmed = fitTrimmed({ ...rows, subsets: samplesFor(columns), random: createRandom(seed) });
  const robust = fitRobust({
    ...rows,
    bisquare,
    // Held: found anew in each step it would grow with a bank of cloud until the cloud lay within it.
    scale: trimmed.kind === 'determined' ? { kind: 'held', value: trimmed.scale } : { kind: 'mad' },
    start: trimmed.kind === 'determined' ? trimmed.coefficients : null,
  });
  if (robust.kind === 'undetermined') return null;
  // Where more than half of the rows fit without any residual there is no scale to weigh the others by.
  const scale = robust.termination.reason === 'exact-fit' ? 1 : robust.scale;
  return {
    coefficients: robust.coefficients,
    standardised: robust.residuals.subarray(0, n).map((r) => r / scale),
    weights: robust.weights.slice(0, n),
  };
}

function samplesFor(columns: number): number {
  return Math.ceil(Math.log(missedChance) / Math.log1p(-(goodShare ** Math.max(1, columns))));
}
