import type { Migration } from '../migrate';

/** Awarded observing proposals: the boundary of access to data. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS programmes (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  code VARCHAR(32) NOT NULL,
  title VARCHAR(200) NOT NULL,
  summary TEXT NOT NULL,
  proprietary_months SMALLINT UNSIGNED NOT NULL DEFAULT 12,
  proprietary_ended_at DATETIME(3) NULL COMMENT 'set when the PI ends the period early',
  archived_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_programmes_public_id (public_id),
  UNIQUE KEY uq_programmes_code (code)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS programmes');
