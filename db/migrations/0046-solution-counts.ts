import type { Migration } from '../migrate';

/** How much a fit was given and used, so that lists need not count its observations. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE solutions
  ADD COLUMN IF NOT EXISTS n_observations INT UNSIGNED NOT NULL DEFAULT 0 AFTER suggested_verdict,
  ADD COLUMN IF NOT EXISTS n_used INT UNSIGNED NOT NULL DEFAULT 0 AFTER n_observations,
  ADD COLUMN IF NOT EXISTS n_stars INT UNSIGNED NOT NULL DEFAULT 0 AFTER n_used,
  ADD COLUMN IF NOT EXISTS n_frames INT UNSIGNED NOT NULL DEFAULT 0 AFTER n_stars
`);

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE solutions
  DROP COLUMN IF EXISTS n_observations, DROP COLUMN IF EXISTS n_used,
  DROP COLUMN IF EXISTS n_stars, DROP COLUMN IF EXISTS n_frames
`);
