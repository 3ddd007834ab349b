import type { Migration } from '../migrate';

/** Links by which a person sets a password; each works once. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS one_time_links (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  person_id INT UNSIGNED NOT NULL,
  purpose VARCHAR(16) NOT NULL,
  token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  expires_at DATETIME(3) NOT NULL,
  used_at DATETIME(3) NULL,
  created_by_id INT UNSIGNED NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_one_time_links_hash (token_hash),
  CONSTRAINT fk_one_time_links_person FOREIGN KEY (person_id) REFERENCES people (id) ON DELETE CASCADE,
  CONSTRAINT fk_one_time_links_creator FOREIGN KEY (created_by_id) REFERENCES people (id),
  CONSTRAINT ck_one_time_links CHECK (purpose IN ('invitation','reset'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS one_time_links');
