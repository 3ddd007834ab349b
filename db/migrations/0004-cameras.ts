import type { Migration } from '../migrate';

/** Detectors. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS cameras (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  telescope_id INT UNSIGNED NOT NULL,
  name VARCHAR(120) NOT NULL,
  width_px INT UNSIGNED NOT NULL,
  height_px INT UNSIGNED NOT NULL,
  pixel_scale DOUBLE NOT NULL COMMENT 'arcsec per pixel',
  gain DOUBLE NOT NULL COMMENT 'electrons per count',
  read_noise DOUBLE NOT NULL COMMENT 'electrons rms',
  saturation DOUBLE NOT NULL COMMENT 'counts; a peak at or above it is flagged',
  UNIQUE KEY uq_cameras_name (telescope_id, name),
  CONSTRAINT fk_cameras_telescope FOREIGN KEY (telescope_id) REFERENCES telescopes (id),
  CONSTRAINT ck_cameras CHECK (pixel_scale > 0 AND gain > 0 AND read_noise >= 0 AND saturation > 0)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS cameras');
