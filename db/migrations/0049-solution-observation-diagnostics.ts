import type { Migration } from '../migrate';

/**
 * An observation as the fit saw it, its own measurement included: a draft stays readable when its measurement set is
 * taken back. A person decides on what is kept in as well as on what is kept out, so the column's name says so.
 */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_observations
  MODIFY COLUMN colour DOUBLE NULL,
  ADD COLUMN IF NOT EXISTS magnitude DOUBLE NULL COMMENT 'published, in the band' AFTER colour,
  ADD COLUMN IF NOT EXISTS inst_mag DOUBLE NOT NULL AFTER hours,
  ADD COLUMN IF NOT EXISTS inst_err DOUBLE NOT NULL AFTER inst_mag,
  ADD COLUMN IF NOT EXISTS standardised DOUBLE NULL AFTER residual,
  ADD COLUMN IF NOT EXISTS influence DOUBLE NULL COMMENT 'Cook''s distance' AFTER leverage,
  MODIFY COLUMN reason VARCHAR(500) NOT NULL DEFAULT '',
  CHANGE COLUMN IF EXISTS rejected_by_id decided_by_id INT UNSIGNED NULL COMMENT 'null: the fit; otherwise the person'
`);

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_observations
  DROP COLUMN IF EXISTS magnitude, DROP COLUMN IF EXISTS inst_mag, DROP COLUMN IF EXISTS inst_err,
  DROP COLUMN IF EXISTS standardised, DROP COLUMN IF EXISTS influence,
  CHANGE COLUMN IF EXISTS decided_by_id rejected_by_id INT UNSIGNED NULL
`);
