import type { Migration } from '../migrate';

/** Spans in which mirror, camera and filters stayed the same, so that colour terms may be shared. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS equipment_epochs (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  telescope_id INT UNSIGNED NOT NULL,
  camera_id INT UNSIGNED NOT NULL,
  starts_on DATE NOT NULL,
  ends_on DATE NULL COMMENT 'first date that no longer belongs to it',
  description VARCHAR(500) NOT NULL,
  colour_terms JSON NOT NULL COMMENT 'per band: value and error, mag per mag; recorded terms that a solve may take as priors',
  UNIQUE KEY uq_equipment_epochs_start (telescope_id, starts_on),
  CONSTRAINT fk_equipment_epochs_telescope FOREIGN KEY (telescope_id) REFERENCES telescopes (id),
  CONSTRAINT fk_equipment_epochs_camera FOREIGN KEY (camera_id) REFERENCES cameras (id),
  CONSTRAINT ck_equipment_epochs CHECK (ends_on IS NULL OR ends_on > starts_on)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS equipment_epochs');
