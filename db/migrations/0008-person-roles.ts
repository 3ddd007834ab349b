import type { Migration } from '../migrate';

/** Roles that hold for the whole observatory. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS person_roles (
  person_id INT UNSIGNED NOT NULL,
  role VARCHAR(16) NOT NULL,
  PRIMARY KEY (person_id, role),
  CONSTRAINT fk_person_roles_person FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE,
  CONSTRAINT ck_person_roles CHECK (role IN ('manager','photometrist','observer'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS person_roles');
