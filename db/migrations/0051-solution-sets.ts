import type { Migration } from '../migrate';

/** Which measurement sets a solution rests on, and which it is used for: what makes a set be in use. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_sets (
  solution_id INT UNSIGNED NOT NULL,
  set_id INT UNSIGNED NOT NULL,
  purpose VARCHAR(16) NOT NULL COMMENT 'standards: fitted; targets: transformed since its approval',
  PRIMARY KEY (solution_id, set_id, purpose),
  KEY ix_solution_sets_set (set_id),
  CONSTRAINT fk_solution_sets_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_sets_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id),
  CONSTRAINT ck_solution_sets CHECK (purpose IN ('standards','targets'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_sets');
