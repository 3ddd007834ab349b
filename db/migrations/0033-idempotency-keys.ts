import type { Migration } from '../migrate';

/** Answers to writes that a client may send again. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS idempotency_keys (
  person_id INT UNSIGNED NOT NULL,
  idempotency_key VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  fingerprint CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL COMMENT 'SHA-256 of method, path and body',
  status SMALLINT UNSIGNED NULL COMMENT 'null while the first request runs',
  body LONGTEXT NULL,
  expires_at DATETIME(3) NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  PRIMARY KEY (person_id, idempotency_key),
  KEY ix_idempotency_keys_expiry (expires_at),
  CONSTRAINT fk_idempotency_keys_person FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS idempotency_keys');
