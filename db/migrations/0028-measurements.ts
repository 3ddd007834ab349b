import type { Migration } from '../migrate';

/** Instrumental magnitudes, up to two million a night: no key but the clustered one, loaded in bulk; references are checked by the loader. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurements (
  set_id INT UNSIGNED NOT NULL,
  row_no INT UNSIGNED NOT NULL COMMENT 'data row in the file, from 1',
  frame_id INT UNSIGNED NOT NULL,
  star_no INT UNSIGNED NOT NULL COMMENT 'measurement_stars of the same set',
  inst_mag DOUBLE NOT NULL,
  inst_err DOUBLE NOT NULL,
  ra DOUBLE NULL, decl DOUBLE NULL,
  x FLOAT NULL, y FLOAT NULL, fwhm FLOAT NULL, sky FLOAT NULL, peak FLOAT NULL,
  flag_no SMALLINT UNSIGNED NULL,
  PRIMARY KEY (set_id, row_no)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurements');
