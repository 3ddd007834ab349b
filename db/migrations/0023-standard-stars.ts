import type { Migration } from '../migrate';

/** Stars with published magnitudes on the standard system. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS standard_stars (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  source_id INT UNSIGNED NOT NULL,
  name VARCHAR(80) NOT NULL,
  name_key VARCHAR(80) NOT NULL COMMENT 'name without case, blanks and hyphens',
  field VARCHAR(80) NOT NULL,
  ra DOUBLE NOT NULL COMMENT 'deg J2000',
  decl DOUBLE NOT NULL COMMENT 'deg J2000',
  pm_ra DOUBLE NULL COMMENT 'mas per year, times cos dec',
  pm_dec DOUBLE NULL COMMENT 'mas per year',
  v DOUBLE NOT NULL, bv DOUBLE NOT NULL, ub DOUBLE NULL, vr DOUBLE NULL, ri DOUBLE NULL, vi DOUBLE NULL,
  e_v DOUBLE NULL, e_bv DOUBLE NULL, e_ub DOUBLE NULL, e_vr DOUBLE NULL, e_ri DOUBLE NULL, e_vi DOUBLE NULL,
  n_observations SMALLINT UNSIGNED NULL,
  is_usable BOOLEAN NOT NULL DEFAULT TRUE,
  caution VARCHAR(300) NOT NULL DEFAULT '',
  UNIQUE KEY uq_standard_stars_name (name_key),
  KEY ix_standard_stars_field (field),
  KEY ix_standard_stars_decl (decl),
  CONSTRAINT fk_standard_stars_source FOREIGN KEY (source_id) REFERENCES standard_sources (id),
  CONSTRAINT ck_standard_stars CHECK (ra >= 0 AND ra < 360 AND decl BETWEEN -90 AND 90)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS standard_stars');
