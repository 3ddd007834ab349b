import type { Migration } from '../migrate';

/** Places on Earth. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS sites (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  observatory_id INT UNSIGNED NOT NULL,
  name VARCHAR(120) NOT NULL,
  longitude DOUBLE NOT NULL COMMENT 'deg, east positive',
  latitude DOUBLE NOT NULL COMMENT 'deg, north positive',
  elevation DOUBLE NOT NULL COMMENT 'm above sea level',
  timezone VARCHAR(64) NOT NULL COMMENT 'IANA name',
  mean_extinction JSON NOT NULL COMMENT 'per band: mean and sigma, mag per airmass, with its source',
  UNIQUE KEY uq_sites_name (observatory_id, name),
  CONSTRAINT fk_sites_observatory FOREIGN KEY (observatory_id) REFERENCES observatories (id),
  CONSTRAINT ck_sites_place CHECK (longitude BETWEEN -180 AND 360 AND latitude BETWEEN -90 AND 90)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS sites');
