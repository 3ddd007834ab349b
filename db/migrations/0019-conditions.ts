import type { Migration } from '../migrate';

/** The sky as somebody, or a sensor, saw it. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS conditions (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  utc DATETIME(3) NOT NULL,
  cloud TINYINT UNSIGNED NULL COMMENT 'eighths',
  seeing DOUBLE NULL COMMENT 'arcsec',
  humidity DOUBLE NULL COMMENT 'percent',
  wind DOUBLE NULL COMMENT 'm/s',
  wind_direction SMALLINT UNSIGNED NULL COMMENT 'deg, where it blows from',
  temperature DOUBLE NULL COMMENT 'deg C',
  sky_brightness DOUBLE NULL COMMENT 'mag per square arcsec',
  comment VARCHAR(500) NOT NULL DEFAULT '',
  recorded_by_id INT UNSIGNED NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_conditions_public_id (public_id),
  KEY ix_conditions_time (night_id, utc),
  CONSTRAINT fk_conditions_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_conditions_person FOREIGN KEY (recorded_by_id) REFERENCES people (id),
  CONSTRAINT ck_conditions CHECK ((cloud IS NULL OR cloud <= 8) AND (humidity IS NULL OR humidity BETWEEN 0 AND 100) AND (wind_direction IS NULL OR wind_direction < 360) AND (wind IS NULL OR wind >= 0) AND (seeing IS NULL OR seeing > 0))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS conditions');
