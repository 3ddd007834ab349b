import type { Migration } from '../migrate';

/** Work to be done once, taken by lease. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS jobs (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  kind VARCHAR(32) NOT NULL,
  payload JSON NOT NULL,
  state VARCHAR(16) NOT NULL DEFAULT 'queued',
  dedupe_key VARCHAR(120) NULL COMMENT 'two jobs with one key cannot exist',
  priority TINYINT NOT NULL DEFAULT 0,
  run_after DATETIME(3) NOT NULL,
  tries TINYINT UNSIGNED NOT NULL DEFAULT 0,
  max_tries TINYINT UNSIGNED NOT NULL DEFAULT 5,
  lease_owner VARCHAR(64) NULL,
  lease_until DATETIME(3) NULL,
  progress DOUBLE NOT NULL DEFAULT 0,
  message VARCHAR(300) NOT NULL DEFAULT '',
  result JSON NULL,
  error JSON NULL,
  cancel_requested_at DATETIME(3) NULL,
  created_by_id INT UNSIGNED NULL,
  night_id INT UNSIGNED NULL,
  programme_id INT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  started_at DATETIME(3) NULL,
  finished_at DATETIME(3) NULL,
  UNIQUE KEY uq_jobs_public_id (public_id),
  UNIQUE KEY uq_jobs_dedupe (dedupe_key),
  KEY ix_jobs_due (state, run_after, priority),
  KEY ix_jobs_lease (state, lease_until),
  KEY ix_jobs_night (night_id),
  CONSTRAINT fk_jobs_person FOREIGN KEY (created_by_id) REFERENCES people (id),
  CONSTRAINT fk_jobs_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_jobs_programme FOREIGN KEY (programme_id) REFERENCES programmes (id),
  CONSTRAINT ck_jobs CHECK (state IN ('queued','running','done','failed','cancelled') AND progress BETWEEN 0 AND 1)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS jobs');
