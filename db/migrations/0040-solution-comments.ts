import type { Migration } from '../migrate';

/** What people said about a solution. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solution_comments (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  solution_id INT UNSIGNED NOT NULL,
  person_id INT UNSIGNED NOT NULL,
  act VARCHAR(16) NOT NULL,
  text TEXT NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  KEY ix_solution_comments_solution (solution_id, id),
  CONSTRAINT fk_solution_comments_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_solution_comments_person FOREIGN KEY (person_id) REFERENCES people (id),
  CONSTRAINT ck_solution_comments CHECK (act IN ('comment','propose','approve','withdraw'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solution_comments');
