import type { Migration } from '../migrate';

/** Signed-in browsers. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS sessions (
  id CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY COMMENT 'SHA-256 of the cookie value, which itself is never stored',
  person_id INT UNSIGNED NOT NULL,
  expires_at DATETIME(3) NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  KEY ix_sessions_person (person_id),
  KEY ix_sessions_expiry (expires_at),
  CONSTRAINT fk_sessions_person FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS sessions');
