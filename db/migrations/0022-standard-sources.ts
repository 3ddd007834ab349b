import type { Migration } from '../migrate';

/** Published tables of standard stars. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS standard_sources (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  code VARCHAR(32) NOT NULL,
  citation VARCHAR(300) NOT NULL,
  note TEXT NOT NULL,
  default_error DOUBLE NOT NULL COMMENT 'mag, where the table gives none',
  UNIQUE KEY uq_standard_sources_code (code)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS standard_sources');
