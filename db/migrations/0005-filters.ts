import type { Migration } from '../migrate';

/** Which bands a telescope observes in. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS filters (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  telescope_id INT UNSIGNED NOT NULL,
  band CHAR(1) NOT NULL,
  name VARCHAR(120) NOT NULL,
  default_exposure DOUBLE NULL COMMENT 's',
  UNIQUE KEY uq_filters_band (telescope_id, band),
  CONSTRAINT fk_filters_telescope FOREIGN KEY (telescope_id) REFERENCES telescopes (id),
  CONSTRAINT ck_filters_band CHECK (band IN ('U','B','V','R','I'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS filters');
