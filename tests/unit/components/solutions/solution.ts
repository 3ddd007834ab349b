import type { Solution, SolutionBand, SolutionCoefficient } from '@/lib/contracts/api/solution';
import { SolveOptions } from '@/lib/contracts/solve-options';

export function coefficient(
  name: SolutionCoefficient['name'],
  value: number | null,
  error: number | null,
  change: Partial<SolutionCoefficient> = {},
): SolutionCoefficient {
  const interval = error === null ? null : 1.98 * error;
  return {
    name,
    status: 'free',
    value,
    error,
    interval_95: interval,
    variance_inflation: 1.4,
    prior: null,
    ...change,
  };
}

export function solvedBand(
  coefficients: readonly SolutionCoefficient[],
  change: Partial<SolutionBand> = {},
): SolutionBand {
  const square = (on: number, off: number) =>
    coefficients.map((_, row) => coefficients.map((_other, column) => (row === column ? on : off)));
  return {
    outcome: 'determined',
    coefficients: [...coefficients],
    covariance: square(3.7e-5, -1.2e-6),
    correlation: square(1, -0.31),
    scatter: { observation: 0.0058, frame: 0.0052 },
    n_used: 101,
    n_rejected: 5,
    n_stars: 37,
    n_frames: 20,
    dof: 97,
    reduced_chi2: 1.03,
    condition_number: 12.4,
    airmass: { min: 1.04, max: 2.11 },
    colour: { min: -0.19, max: 1.64 },
    colour_index: 'B−V',
    utc: { first: '2026-11-03T19:24:00.000Z', last: '2026-11-04T05:12:00.000Z' },
    leave_one_star_out: 0.011,
    drift: { value: -0.0007, error: 0.0009 },
    runs: 0.4,
    cross_checks: {
      bouguer: [{ star: '114-750', extinction: 0.151, error: 0.004, n: 9 }],
      high_low: { extinction: 0.147, error: 0.006, n: 12 },
      colour_pairs: null,
    },
    warnings: [],
    ...change,
  };
}

const bandB = solvedBand([
  coefficient('zero_point', 3.1042, 0.0061),
  coefficient('extinction', 0.2587, 0.0041),
  coefficient('colour_term', 0.0812, 0.0027),
  coefficient('second_order_extinction', -0.0281, 0.0052, {
    status: 'prior',
    prior: { value: -0.03, error: 0.01 },
  }),
]);
const bandV = solvedBand([
  coefficient('zero_point', 2.7518, 0.0043),
  coefficient('extinction', 0.1493, 0.0029),
  coefficient('colour_term', -0.0409, 0.0022),
  coefficient('second_order_extinction', 0, 0, { status: 'fixed' }),
]);

/** A solved draft of two bands, with what a test says otherwise. */
export function solution(change: Partial<Solution> = {}): Solution {
  return {
    id: '3kq8v7m2t0x3',
    number: 3,
    night: '3kq8v7m2t0n1',
    night_date: '2026-11-03',
    telescope: 'HT60',
    state: 'draft',
    outcome: 'determined',
    verdict: null,
    suggested_verdict: 'photometric',
    bands: { B: bandB, V: bandV },
    joint_nights: [],
    model: { options: SolveOptions.parse({}), airmass_formula: 'young1994' },
    inputs: {
      sets: [{ id: '3kq8v7m2t0s1', name: 'standards', sha256: 'ab'.repeat(32) }],
      standards_source: 'Landolt 1992',
      equipment_epoch: 'from 2026-01-01',
      hash: 'cd'.repeat(32),
    },
    findings: [],
    evidence: [
      {
        speaks: 'for',
        kind: 'scatter',
        band: null,
        words: 'Scatter 0.008 in V and 0.009 in B: within 0.02 and 0.03.',
      },
      {
        speaks: 'care',
        kind: 'structure',
        band: null,
        words: 'Frames 29 to 31 stand 0.04 mag faint together, and were rejected as a run.',
      },
    ],
    n_observations: 212,
    n_used: 203,
    n_rejected: 9,
    n_stars: 37,
    n_frames: 40,
    software_version: '0.1.0',
    follows: null,
    superseded_by: null,
    version: 1,
    created_by: 'Noor Hathaway',
    created_at: '2026-11-04T10:00:00.000Z',
    solved_at: '2026-11-04T10:00:09.000Z',
    proposed: null,
    approved: null,
    withdrawn: null,
    job: { id: '3kq8v7m2t0j1', state: 'done', progress: 1, message: '' },
    may: {
      solve_again: true,
      exclude: true,
      propose: true,
      approve: false,
      withdraw: true,
      comment: true,
      why_not_approve: 'Only a proposed solution can be approved.',
    },
    ...change,
  };
}
