import { z } from 'zod';
import { line } from './common';
import { figure, tick } from './form-fields';

/**
 * Rules of an observatory, with their defaults. What is not in the database has its default, so that a new setting needs
 * no migration.
 */
export const Settings = z.object({
  /** Whether releases that are public can be read without sign-in. Default: the data policy of the service. */
  publicReleases: z.boolean().default(true),
  /** Whether a solution must be approved by another person than its proposer. Default: two-person approval. */
  secondApprover: z.boolean().default(true),
  /** Months from the night after which a new programme's data become public. Default: the data policy of the service. */
  proprietaryMonths: z.number().int().min(0).max(120).default(12),
  verdict: z
    .object({
      /** REML scatter in V up to which a night may be called photometric [mag]. Common practice, no source. */
      scatterV: z.number().min(0).max(1).default(0.02),
      /** The same in B [mag]. Common practice, no source. */
      scatterB: z.number().min(0).max(1).default(0.03),
      /** Scatter in any band above which a night is called not photometric [mag]. Common practice, no source. */
      notPhotometric: z.number().min(0).max(1).default(0.05),
      /** Drift of a zero point that counts as significant [its standard errors]. Common practice, no source. */
      driftSigma: z.number().min(1).max(10).default(3),
    })
    .prefault({}),
});
export type Settings = z.output<typeof Settings>;

/** Settings as stored, completed by the defaults. Throws when they are not settings: that is a bug, not input. */
export const readSettings = (stored: unknown): Settings => Settings.parse(stored ?? {});

export const defaultSettings: Settings = readSettings({});

const practice = 'common practice, no source';
/** Where each default comes from, as the interface shows it. */
export const settingSources = {
  publicReleases: 'releases become public when their proprietary period ends',
  secondApprover: 'the person who proposed a solution does not approve it',
  proprietaryMonths: 'twelve months after the night',
  scatterV: practice,
  scatterB: practice,
  notPhotometric: practice,
  driftSigma: practice,
} as const;

const scatter = figure({ min: 0.001, max: 1, unit: 'mag' });

/** The form of the settings page. */
export const ChangeSettings = z
  .object({
    name: line(120).min(1, 'is missing'),
    publicReleases: tick,
    secondApprover: tick,
    proprietaryMonths: figure({ min: 0, max: 120, unit: 'months', whole: true }),
    scatterV: scatter,
    scatterB: scatter,
    notPhotometric: scatter,
    driftSigma: figure({ min: 1, max: 10, unit: 'standard errors' }),
  })
  .superRefine(({ scatterV, scatterB, notPhotometric }, context) => {
    if (notPhotometric >= Math.max(scatterV, scatterB)) return;
    context.addIssue({
      code: 'custom',
      path: ['notPhotometric'],
      message: 'must not be below the limits for photometric nights',
    });
  });
