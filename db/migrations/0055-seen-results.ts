import type { Migration } from '../migrate';

/** Which results a person has opened: the others are new to them. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS seen_results (
  person_id INT UNSIGNED NOT NULL,
  transformation_id INT UNSIGNED NOT NULL,
  seen_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  PRIMARY KEY (person_id, transformation_id),
  KEY ix_seen_results_transformation (transformation_id),
  CONSTRAINT fk_seen_results_person FOREIGN KEY (person_id) REFERENCES people (id),
  CONSTRAINT fk_seen_results_transformation FOREIGN KEY (transformation_id) REFERENCES transformations (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS seen_results');
