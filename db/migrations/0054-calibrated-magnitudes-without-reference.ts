import type { Migration } from '../migrate';

/**
 * The check of the reference would hold a transformation's row through its whole load: whoever withdraws the solution
 * meanwhile would wait for that, or deadlock with it. Its rows come from one loader, as those of measurements do.
 */
export const up: Migration = ({ run }) =>
  run('ALTER TABLE calibrated_magnitudes DROP FOREIGN KEY IF EXISTS fk_calibrated_magnitudes_transformation');

export const down: Migration = ({ run }) =>
  run(`
ALTER TABLE calibrated_magnitudes
  ADD CONSTRAINT fk_calibrated_magnitudes_transformation FOREIGN KEY IF NOT EXISTS (transformation_id) REFERENCES transformations (id)
`);
