import type { Migration } from '../migrate';

/** A reason has as much room here as in the audit trail. */
export const up: Migration = ({ run }) =>
  run('ALTER TABLE solution_exclusions MODIFY COLUMN reason VARCHAR(500) NOT NULL');

export const down: Migration = ({ run }) =>
  run('ALTER TABLE solution_exclusions MODIFY COLUMN reason VARCHAR(300) NOT NULL');
