import type { SolutionObservation } from '@/lib/contracts/api/solution';

let next = 1;

/** An observation that was used, with what a test says otherwise. */
export function observation(change: Partial<SolutionObservation> = {}): SolutionObservation {
  const row = next++;
  return {
    observation: `3kq8v7m2t0xc.${row}`,
    night_date: '2026-11-03',
    frame: 22,
    star: '114-750',
    band: 'V',
    utc_mid: '2026-11-03T21:40:00.000Z',
    airmass: 1.4,
    colour: -0.041,
    magnitude: 11.9,
    inst_mag: 14.2,
    inst_err: 0.004,
    residual: 0.01,
    standardised: 1.1,
    weight: 0.9,
    leverage: 0.02,
    influence: 0.01,
    used: true,
    reason: '',
    decided_by: null,
    ...change,
  };
}
