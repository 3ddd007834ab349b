import type { Migration } from '../migrate';

/** One exposure each, with its geometry at mid-exposure. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS frames (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  number INT UNSIGNED NOT NULL,
  type VARCHAR(16) NOT NULL,
  file VARCHAR(255) NULL,
  object VARCHAR(80) NOT NULL DEFAULT '',
  field VARCHAR(80) NULL COMMENT 'standard field',
  programme_id INT UNSIGNED NULL,
  ra DOUBLE NULL COMMENT 'deg J2000',
  decl DOUBLE NULL COMMENT 'deg J2000',
  band CHAR(1) NULL,
  utc_start DATETIME(3) NOT NULL,
  exposure DOUBLE NOT NULL COMMENT 's',
  utc_mid DATETIME(3) NOT NULL,
  airmass DOUBLE NULL,
  altitude DOUBLE NULL COMMENT 'deg, true, at mid-exposure',
  hour_angle DOUBLE NULL COMMENT 'hours, west positive, at mid-exposure',
  moon_separation DOUBLE NULL COMMENT 'deg',
  sun_altitude DOUBLE NOT NULL COMMENT 'deg',
  fwhm DOUBLE NULL COMMENT 'arcsec',
  sky DOUBLE NULL COMMENT 'mag per square arcsec',
  comment VARCHAR(500) NOT NULL DEFAULT '',
  origin VARCHAR(16) NOT NULL,
  version INT UNSIGNED NOT NULL DEFAULT 1,
  logged_by_id INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_frames_public_id (public_id),
  UNIQUE KEY uq_frames_number (night_id, number),
  UNIQUE KEY uq_frames_file (night_id, file),
  KEY ix_frames_time (night_id, utc_mid),
  KEY ix_frames_programme (programme_id, night_id),
  CONSTRAINT fk_frames_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_frames_programme FOREIGN KEY (programme_id) REFERENCES programmes (id),
  CONSTRAINT fk_frames_logger FOREIGN KEY (logged_by_id) REFERENCES people (id),
  CONSTRAINT ck_frames_type CHECK (type IN ('bias','dark','flat','standard','target','focus','test')),
  CONSTRAINT ck_frames_band CHECK (band IS NULL OR band IN ('U','B','V','R','I')),
  CONSTRAINT ck_frames_origin CHECK (origin IN ('log','header','api','upload')),
  CONSTRAINT ck_frames_values CHECK (exposure >= 0 AND (ra IS NULL) = (decl IS NULL) AND (ra IS NULL OR (ra >= 0 AND ra < 360)) AND (decl IS NULL OR decl BETWEEN -90 AND 90))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS frames');
