/** Evidence on a night and the verdict that it suggests; a person decides. */
import type { BandName } from './bands';

export const verdicts = ['photometric', 'usable with care', 'not photometric'] as const;
export type Verdict = (typeof verdicts)[number];

/** Limits of the suggestion, editable per observatory. */
export interface VerdictLimits {
  /** Scatter of observation and frame together up to which a band counts as photometric [mag]. */
  readonly scatterV: number;
  readonly scatterB: number;
  /** Scatter in any band above which the night is not photometric [mag]. */
  readonly notPhotometric: number;
  /** Drift that counts as significant [its standard errors]. */
  readonly driftSigma: number;
}

/** Mean first-order extinction of the site and its night-to-night scatter, per band. */
export type ExtinctionHistory = Readonly<
  Partial<Record<BandName, { readonly mean: number; readonly scatter: number; readonly n: number }>>
>;

/** One piece of evidence, in words that a page shows as they stand. */
export interface EvidenceItem {
  /** For photometric, for care, or against. */
  readonly speaks: 'for' | 'care' | 'against';
  readonly kind:
    'scatter' | 'rejected' | 'drift' | 'runs' | 'extinction' | 'coverage' | 'structure' | 'undetermined';
  readonly band: BandName | null;
  /** A whole sentence. */
  readonly words: string;
}

export interface NightEvidence {
  readonly items: readonly EvidenceItem[];
  readonly suggested: Verdict;
}
