import type { Migration } from '../migrate';

/** Target magnitudes made with one solution for one programme; kept when a later solution replaces them. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS transformations (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  solution_id INT UNSIGNED NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  programme_id INT UNSIGNED NULL,
  state VARCHAR(16) NOT NULL DEFAULT 'queued',
  n_stars INT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  finished_at DATETIME(3) NULL,
  UNIQUE KEY uq_transformations_public_id (public_id),
  UNIQUE KEY uq_transformations (solution_id, night_id, programme_id),
  KEY ix_transformations_night (night_id, programme_id),
  CONSTRAINT fk_transformations_solution FOREIGN KEY (solution_id) REFERENCES solutions (id),
  CONSTRAINT fk_transformations_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_transformations_programme FOREIGN KEY (programme_id) REFERENCES programmes (id),
  CONSTRAINT ck_transformations CHECK (state IN ('queued','done','withdrawn'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS transformations');
