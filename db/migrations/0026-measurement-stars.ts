import type { Migration } from '../migrate';

/** The distinct stars of a set and what each was matched to. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurement_stars (
  set_id INT UNSIGNED NOT NULL,
  star_no INT UNSIGNED NOT NULL,
  name VARCHAR(80) NOT NULL DEFAULT '' COMMENT 'as written in the table; empty where stars are given by position only',
  ra DOUBLE NULL COMMENT 'deg J2000, of its first row',
  decl DOUBLE NULL,
  n_rows INT UNSIGNED NOT NULL,
  standard_id INT UNSIGNED NULL,
  matched_by VARCHAR(16) NULL,
  separation DOUBLE NULL COMMENT 'arcsec from the published position, of its first row',
  reason VARCHAR(300) NOT NULL DEFAULT '' COMMENT 'why it is not matched, or a caution',
  PRIMARY KEY (set_id, star_no),
  KEY ix_measurement_stars_standard (standard_id),
  CONSTRAINT fk_measurement_stars_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id),
  CONSTRAINT fk_measurement_stars_standard FOREIGN KEY (standard_id) REFERENCES standard_stars (id),
  CONSTRAINT ck_measurement_stars CHECK (matched_by IS NULL OR matched_by IN ('name','position'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurement_stars');
