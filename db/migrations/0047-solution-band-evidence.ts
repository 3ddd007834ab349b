import type { Migration } from '../migrate';

/** What stands beside the coefficients of a band: outcome, correlation, tests and cross-checks. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_bands
  ADD COLUMN IF NOT EXISTS outcome VARCHAR(16) NOT NULL AFTER colour_index,
  ADD COLUMN IF NOT EXISTS correlation JSON NOT NULL COMMENT 'like covariance; null where a variance is zero' AFTER covariance,
  ADD COLUMN IF NOT EXISTS n_stars INT UNSIGNED NOT NULL AFTER n_rejected,
  ADD COLUMN IF NOT EXISTS n_frames INT UNSIGNED NOT NULL AFTER n_stars,
  ADD COLUMN IF NOT EXISTS leave_one_star_out DOUBLE NULL COMMENT 'mag' AFTER utc_last,
  ADD COLUMN IF NOT EXISTS drift_value DOUBLE NULL COMMENT 'mag per hour, fitted beside' AFTER leave_one_star_out,
  ADD COLUMN IF NOT EXISTS drift_error DOUBLE NULL AFTER drift_value,
  ADD COLUMN IF NOT EXISTS runs DOUBLE NULL COMMENT 'standard normal deviate of the runs test' AFTER drift_error,
  ADD COLUMN IF NOT EXISTS cross_checks JSON NOT NULL AFTER runs,
  ADD CONSTRAINT IF NOT EXISTS ck_solution_bands_outcome CHECK (outcome IN ('determined','undetermined'))
`);

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_bands
  DROP CONSTRAINT IF EXISTS ck_solution_bands_outcome,
  DROP COLUMN IF EXISTS outcome, DROP COLUMN IF EXISTS correlation, DROP COLUMN IF EXISTS n_stars,
  DROP COLUMN IF EXISTS n_frames, DROP COLUMN IF EXISTS leave_one_star_out, DROP COLUMN IF EXISTS drift_value,
  DROP COLUMN IF EXISTS drift_error, DROP COLUMN IF EXISTS runs, DROP COLUMN IF EXISTS cross_checks
`);
