import type { Migration } from '../migrate';

/** What was wrong with a refused table: the first thousand, each with its place. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurement_faults (
  set_id INT UNSIGNED NOT NULL,
  seq SMALLINT UNSIGNED NOT NULL,
  line INT UNSIGNED NULL,
  column_name VARCHAR(120) NULL,
  value VARCHAR(200) NULL,
  message VARCHAR(500) NOT NULL,
  remedy VARCHAR(500) NOT NULL DEFAULT '',
  PRIMARY KEY (set_id, seq),
  CONSTRAINT fk_measurement_faults_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurement_faults');
