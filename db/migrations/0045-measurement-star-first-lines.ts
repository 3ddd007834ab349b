import type { Migration } from '../migrate';

/** Where in the file a star stands first, for whoever looks after one that was not matched. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE measurement_stars
  ADD COLUMN IF NOT EXISTS first_line INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'line of the file' AFTER n_rows
`);

export const down: Migration = ({ run }) =>
  run('ALTER TABLE measurement_stars DROP COLUMN IF EXISTS first_line');
