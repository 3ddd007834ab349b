import type { Migration } from '../migrate';

/** What a programme observes. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS programme_targets (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  programme_id INT UNSIGNED NOT NULL,
  name VARCHAR(80) NOT NULL,
  name_key VARCHAR(80) NOT NULL COMMENT 'name without case, blanks and hyphens',
  kind VARCHAR(16) NOT NULL,
  ra DOUBLE NOT NULL COMMENT 'deg J2000',
  decl DOUBLE NOT NULL COMMENT 'deg J2000',
  note VARCHAR(500) NOT NULL DEFAULT '',
  UNIQUE KEY uq_programme_targets_name (programme_id, name_key),
  CONSTRAINT fk_programme_targets_programme FOREIGN KEY (programme_id) REFERENCES programmes (id) ON DELETE CASCADE,
  CONSTRAINT ck_programme_targets CHECK (kind IN ('star','cluster','field') AND ra >= 0 AND ra < 360 AND decl BETWEEN -90 AND 90)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS programme_targets');
