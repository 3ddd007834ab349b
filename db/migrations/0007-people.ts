import type { Migration } from '../migrate';

/** People who sign in. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS people (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  email VARCHAR(254) NOT NULL,
  name VARCHAR(120) NOT NULL,
  password_hash VARCHAR(255) NULL COMMENT 'argon2id; null until the one-time link is used',
  light VARCHAR(16) NOT NULL DEFAULT 'day',
  disabled_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_people_public_id (public_id),
  UNIQUE KEY uq_people_email (email),
  CONSTRAINT ck_people_light CHECK (light IN ('day','dusk','dark-site'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS people');
