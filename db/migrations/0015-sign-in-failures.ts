import type { Migration } from '../migrate';

/** Failed sign-ins, which slow down the next ones. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS sign_in_failures (
  subject CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY COMMENT 'SHA-256 of the e-mail address or of the network address',
  failures INT UNSIGNED NOT NULL,
  last_failed_at DATETIME(3) NOT NULL,
  next_try_at DATETIME(3) NOT NULL
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS sign_in_failures');
