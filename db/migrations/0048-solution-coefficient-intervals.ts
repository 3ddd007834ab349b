import type { Migration } from '../migrate';

/** How far a coefficient may be off with few degrees of freedom, and how much the others blur it. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_coefficients
  ADD COLUMN IF NOT EXISTS interval95 DOUBLE NULL COMMENT 'half width, by Student t' AFTER error,
  ADD COLUMN IF NOT EXISTS variance_inflation DOUBLE NULL AFTER interval95
`);

export const down: Migration = ({ run }) =>
  run(
    'ALTER TABLE solution_coefficients DROP COLUMN IF EXISTS interval95, DROP COLUMN IF EXISTS variance_inflation',
  );
