import type { Migration } from '../migrate';

/** Observing time lost, and to what. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS time_losses (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  night_id INT UNSIGNED NOT NULL,
  cause VARCHAR(16) NOT NULL,
  minutes SMALLINT UNSIGNED NOT NULL,
  comment VARCHAR(500) NOT NULL DEFAULT '',
  recorded_by_id INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  KEY ix_time_losses_night (night_id),
  CONSTRAINT fk_time_losses_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_time_losses_person FOREIGN KEY (recorded_by_id) REFERENCES people (id),
  CONSTRAINT ck_time_losses CHECK (cause IN ('weather','technical','other') AND minutes BETWEEN 1 AND 1440)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS time_losses');
