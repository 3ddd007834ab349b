import type { Migration } from '../migrate';

/** The distinct flag texts of a set, so that rows carry a number. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurement_flags (
  set_id INT UNSIGNED NOT NULL,
  flag_no SMALLINT UNSIGNED NOT NULL,
  text VARCHAR(120) NOT NULL,
  PRIMARY KEY (set_id, flag_no),
  CONSTRAINT fk_measurement_flags_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurement_flags');
