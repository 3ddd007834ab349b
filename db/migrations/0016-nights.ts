import type { Migration } from '../migrate';

/** One telescope, one local evening date. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS nights (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  telescope_id INT UNSIGNED NOT NULL,
  date DATE NOT NULL COMMENT 'local evening date',
  starts_at DATETIME(3) NOT NULL COMMENT 'local noon, UTC',
  ends_at DATETIME(3) NOT NULL COMMENT 'next local noon, UTC',
  state VARCHAR(16) NOT NULL DEFAULT 'open',
  summary TEXT NOT NULL,
  version INT UNSIGNED NOT NULL DEFAULT 1,
  opened_by_id INT UNSIGNED NOT NULL,
  closed_by_id INT UNSIGNED NULL,
  closed_at DATETIME(3) NULL,
  reopened_reason VARCHAR(500) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_nights_public_id (public_id),
  UNIQUE KEY uq_nights_date (telescope_id, date),
  KEY ix_nights_state (state, date),
  KEY ix_nights_date (date),
  CONSTRAINT fk_nights_telescope FOREIGN KEY (telescope_id) REFERENCES telescopes (id),
  CONSTRAINT fk_nights_opener FOREIGN KEY (opened_by_id) REFERENCES people (id),
  CONSTRAINT fk_nights_closer FOREIGN KEY (closed_by_id) REFERENCES people (id),
  CONSTRAINT ck_nights CHECK (state IN ('open','closed','calibrated') AND ends_at > starts_at)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS nights');
