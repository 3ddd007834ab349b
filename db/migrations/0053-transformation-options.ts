import type { Migration } from '../migrate';

/** What a transformation was asked with, and how many measurements it was made from. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE transformations
  ADD COLUMN IF NOT EXISTS options JSON NULL COMMENT 'assumed colour and limits of the flags' AFTER n_stars,
  ADD COLUMN IF NOT EXISTS n_measurements INT UNSIGNED NULL AFTER options,
  ADD COLUMN IF NOT EXISTS n_left_out INT UNSIGNED NULL COMMENT 'not usable: see lib/server/reads/target-columns.ts' AFTER n_measurements
`);

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE transformations
  DROP COLUMN IF EXISTS options, DROP COLUMN IF EXISTS n_measurements, DROP COLUMN IF EXISTS n_left_out
`);
