import type { Migration } from '../migrate';

/** How a telescope's tables name their columns, as somebody said once. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS column_mappings (
  telescope_id INT UNSIGNED NOT NULL,
  header_key CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL COMMENT 'SHA-256 of the lower-case header names in order',
  headers JSON NOT NULL,
  mapping JSON NOT NULL,
  saved_by_id INT UNSIGNED NOT NULL,
  saved_at DATETIME(3) NOT NULL,
  PRIMARY KEY (telescope_id, header_key),
  CONSTRAINT fk_column_mappings_telescope FOREIGN KEY (telescope_id) REFERENCES telescopes (id),
  CONSTRAINT fk_column_mappings_person FOREIGN KEY (saved_by_id) REFERENCES people (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS column_mappings');
