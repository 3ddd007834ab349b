import type { Migration } from '../migrate';

/** Uploaded tables of instrumental magnitudes, kept whole. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurement_sets (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  kind VARCHAR(16) NOT NULL,
  name VARCHAR(120) NOT NULL,
  state VARCHAR(16) NOT NULL DEFAULT 'received',
  file_name VARCHAR(255) NOT NULL,
  content_type VARCHAR(80) NOT NULL,
  size BIGINT UNSIGNED NOT NULL COMMENT 'bytes',
  sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL COMMENT 'of the original bytes, which lib/server/storage keeps under this name',
  tolerance DOUBLE NOT NULL COMMENT 'arcsec, for matching by position',
  mapping JSON NOT NULL COMMENT 'column of the table to header in the file, as applied',
  comments MEDIUMTEXT NOT NULL COMMENT 'the lines before the header that begin with #',
  n_rows INT UNSIGNED NULL,
  n_matched INT UNSIGNED NULL COMMENT 'rows matched to a standard star',
  n_frames_created INT UNSIGNED NOT NULL DEFAULT 0,
  n_faults INT UNSIGNED NOT NULL DEFAULT 0,
  uploaded_by_id INT UNSIGNED NOT NULL,
  checked_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_measurement_sets_public_id (public_id),
  KEY ix_measurement_sets_night (night_id, created_at),
  KEY ix_measurement_sets_sha (night_id, sha256),
  CONSTRAINT fk_measurement_sets_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_measurement_sets_person FOREIGN KEY (uploaded_by_id) REFERENCES people (id),
  CONSTRAINT ck_measurement_sets CHECK (kind IN ('standard','target','mixed') AND state IN ('received','checked','matched','in use','refused') AND tolerance > 0)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurement_sets');
