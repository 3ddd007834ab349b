import type { Migration } from '../migrate';

/** Free text in the log. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS remarks (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  utc DATETIME(3) NOT NULL,
  text TEXT NOT NULL,
  written_by_id INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_remarks_public_id (public_id),
  KEY ix_remarks_time (night_id, utc),
  CONSTRAINT fk_remarks_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_remarks_person FOREIGN KEY (written_by_id) REFERENCES people (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS remarks');
