import type { Migration } from '../migrate';

/** A person's decisions on observations, inputs of the fit. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_exclusions (
  solution_id INT UNSIGNED NOT NULL,
  set_id INT UNSIGNED NOT NULL,
  row_no INT UNSIGNED NOT NULL,
  is_excluded BOOLEAN NOT NULL COMMENT 'false: kept in, whatever the fit thinks of it',
  reason VARCHAR(300) NOT NULL,
  person_id INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  PRIMARY KEY (solution_id, set_id, row_no),
  CONSTRAINT fk_solution_exclusions_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_exclusions_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id),
  CONSTRAINT fk_solution_exclusions_person FOREIGN KEY (person_id) REFERENCES people (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_exclusions');
