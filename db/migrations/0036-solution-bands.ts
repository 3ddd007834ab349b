import type { Migration } from '../migrate';

/** What a solution found for one band of one night. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_bands (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  solution_id INT UNSIGNED NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  band CHAR(1) NOT NULL,
  colour_index CHAR(2) NOT NULL,
  covariance JSON NOT NULL COMMENT 'square, in the order of solution_coefficients.seq',
  scatter_observation DOUBLE NULL, scatter_frame DOUBLE NULL,
  n_used INT UNSIGNED NOT NULL, n_rejected INT UNSIGNED NOT NULL,
  dof DOUBLE NULL, reduced_chi2 DOUBLE NULL, condition_number DOUBLE NULL,
  airmass_min DOUBLE NULL, airmass_max DOUBLE NULL, colour_min DOUBLE NULL, colour_max DOUBLE NULL,
  utc_first DATETIME(3) NULL, utc_last DATETIME(3) NULL,
  warnings JSON NOT NULL,
  UNIQUE KEY uq_solution_bands (solution_id, night_id, band),
  CONSTRAINT fk_solution_bands_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_bands_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT ck_solution_bands CHECK (band IN ('U','B','V','R','I'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_bands');
