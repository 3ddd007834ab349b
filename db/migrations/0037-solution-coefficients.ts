import type { Migration } from '../migrate';

/** Coefficients with their errors. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_coefficients (
  solution_band_id INT UNSIGNED NOT NULL,
  seq TINYINT UNSIGNED NOT NULL,
  name VARCHAR(24) NOT NULL,
  status VARCHAR(8) NOT NULL,
  value DOUBLE NULL COMMENT 'null where the observations cannot determine it',
  error DOUBLE NULL,
  prior_value DOUBLE NULL, prior_error DOUBLE NULL,
  PRIMARY KEY (solution_band_id, seq),
  UNIQUE KEY uq_solution_coefficients_name (solution_band_id, name),
  CONSTRAINT fk_solution_coefficients_band FOREIGN KEY (solution_band_id) REFERENCES solution_bands (id),
  CONSTRAINT ck_solution_coefficients CHECK (status IN ('free','fixed','prior') AND name IN ('zero_point','extinction','colour_term','second_order_extinction','drift','extinction_drift','colour_term_2'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_coefficients');
