import type { Migration } from '../migrate';

/** Every observation that a fit saw: its residual, its weight and, if it was left out, why. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_observations (
  solution_id INT UNSIGNED NOT NULL,
  seq INT UNSIGNED NOT NULL,
  set_id INT UNSIGNED NOT NULL,
  row_no INT UNSIGNED NOT NULL,
  frame_id INT UNSIGNED NOT NULL,
  standard_id INT UNSIGNED NOT NULL,
  band CHAR(1) NOT NULL,
  airmass DOUBLE NOT NULL, colour DOUBLE NOT NULL, hours DOUBLE NOT NULL,
  residual DOUBLE NULL, weight DOUBLE NULL, leverage DOUBLE NULL,
  is_used BOOLEAN NOT NULL,
  reason VARCHAR(300) NOT NULL DEFAULT '',
  rejected_by_id INT UNSIGNED NULL COMMENT 'null: the fit; otherwise the person',
  PRIMARY KEY (solution_id, seq),
  KEY ix_solution_observations_row (set_id, row_no),
  CONSTRAINT fk_solution_observations_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_observations_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id),
  CONSTRAINT fk_solution_observations_frame FOREIGN KEY (frame_id) REFERENCES frames (id),
  CONSTRAINT fk_solution_observations_standard FOREIGN KEY (standard_id) REFERENCES standard_stars (id),
  CONSTRAINT fk_solution_observations_person FOREIGN KEY (rejected_by_id) REFERENCES people (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_observations');
