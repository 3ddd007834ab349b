import type { Migration } from '../migrate';

/** The instant from which a solution counts its hours: whoever uses its drifts must count from the same. */
export const up: Migration = ({ run }) =>
  run(`
ALTER TABLE solution_nights
  ADD COLUMN IF NOT EXISTS utc_zero DATETIME(3) NULL COMMENT 'mean time of the night''s standards; null until solved'
`);

export const down: Migration = ({ run }) => run('ALTER TABLE solution_nights DROP COLUMN IF EXISTS utc_zero');
