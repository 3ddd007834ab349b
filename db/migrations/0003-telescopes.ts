import type { Migration } from '../migrate';

/** Telescopes, known to clients by their code. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS telescopes (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  site_id INT UNSIGNED NOT NULL,
  code VARCHAR(32) NOT NULL,
  name VARCHAR(120) NOT NULL,
  aperture_m DOUBLE NOT NULL,
  min_altitude DOUBLE NOT NULL DEFAULT 15 COMMENT 'deg, lowest pointing',
  retired_on DATE NULL,
  UNIQUE KEY uq_telescopes_code (code),
  CONSTRAINT fk_telescopes_site FOREIGN KEY (site_id) REFERENCES sites (id),
  CONSTRAINT ck_telescopes CHECK (aperture_m > 0 AND min_altitude BETWEEN 0 AND 90)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS telescopes');
