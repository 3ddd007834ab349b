import type { Migration } from '../migrate';

/** The nights that one solution joins. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_nights (
  solution_id INT UNSIGNED NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  PRIMARY KEY (solution_id, night_id),
  KEY ix_solution_nights_night (night_id),
  CONSTRAINT fk_solution_nights_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_nights_night FOREIGN KEY (night_id) REFERENCES nights (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_nights');
