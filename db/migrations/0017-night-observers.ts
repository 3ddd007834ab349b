import type { Migration } from '../migrate';

/** Whose night it is. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS night_observers (
  night_id INT UNSIGNED NOT NULL,
  person_id INT UNSIGNED NOT NULL,
  PRIMARY KEY (night_id, person_id),
  KEY ix_night_observers_person (person_id),
  CONSTRAINT fk_night_observers_night FOREIGN KEY (night_id) REFERENCES nights (id) ON DELETE CASCADE,
  CONSTRAINT fk_night_observers_person FOREIGN KEY (person_id) REFERENCES people (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS night_observers');
