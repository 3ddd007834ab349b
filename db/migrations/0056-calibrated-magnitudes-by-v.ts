import type { Migration } from '../migrate';

/**
 * The list of a result opens by V, stars without V last: of a million stars the first page is read from the index, not
 * sorted. The column is invisible, so that `SELECT *` and LOAD DATA still mean what is measured.
 */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE calibrated_magnitudes
  ADD COLUMN IF NOT EXISTS no_v TINYINT UNSIGNED AS (v IS NULL) VIRTUAL INVISIBLE,
  ADD INDEX IF NOT EXISTS ix_calibrated_magnitudes_v (transformation_id, no_v, v, star_no)
`);

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE calibrated_magnitudes
  DROP INDEX IF EXISTS ix_calibrated_magnitudes_v,
  DROP COLUMN IF EXISTS no_v
`);
