import type { Migration } from '../migrate';

/** Magnitudes on the standard system, random and systematic error apart. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS calibrated_magnitudes (
  transformation_id INT UNSIGNED NOT NULL,
  star_no INT UNSIGNED NOT NULL,
  star VARCHAR(80) NOT NULL,
  ra DOUBLE NULL, decl DOUBLE NULL,
  n_u SMALLINT UNSIGNED NOT NULL DEFAULT 0, n_b SMALLINT UNSIGNED NOT NULL DEFAULT 0, n_v SMALLINT UNSIGNED NOT NULL DEFAULT 0, n_r SMALLINT UNSIGNED NOT NULL DEFAULT 0, n_i SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  v DOUBLE NULL, v_random DOUBLE NULL, v_systematic DOUBLE NULL,
  b DOUBLE NULL, b_random DOUBLE NULL, b_systematic DOUBLE NULL,
  bv DOUBLE NULL, bv_random DOUBLE NULL, bv_systematic DOUBLE NULL,
  ub DOUBLE NULL, ub_random DOUBLE NULL, ub_systematic DOUBLE NULL,
  vr DOUBLE NULL, vr_random DOUBLE NULL, vr_systematic DOUBLE NULL,
  vi DOUBLE NULL, vi_random DOUBLE NULL, vi_systematic DOUBLE NULL,
  bjd_tdb DOUBLE NULL, airmass DOUBLE NULL,
  flags INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'bits of lib/photometry flags',
  PRIMARY KEY (transformation_id, star_no),
  CONSTRAINT fk_calibrated_magnitudes_transformation FOREIGN KEY (transformation_id) REFERENCES transformations (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS calibrated_magnitudes');
