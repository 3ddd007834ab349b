import type { Migration } from '../migrate';

/** Who belongs to a programme, and as what. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS programme_members (
  programme_id INT UNSIGNED NOT NULL,
  person_id INT UNSIGNED NOT NULL,
  role VARCHAR(16) NOT NULL,
  PRIMARY KEY (programme_id, person_id),
  KEY ix_programme_members_person (person_id),
  CONSTRAINT fk_programme_members_programme FOREIGN KEY (programme_id) REFERENCES programmes (id) ON DELETE CASCADE,
  CONSTRAINT fk_programme_members_person FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE,
  CONSTRAINT ck_programme_members CHECK (role IN ('pi','coinvestigator'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS programme_members');
