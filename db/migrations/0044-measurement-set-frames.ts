import type { Migration } from '../migrate';

/** Which frames a set has measurements on: what a person may see of it, and what of the log must stay, without reading its rows. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS measurement_set_frames (
  set_id INT UNSIGNED NOT NULL,
  frame_id INT UNSIGNED NOT NULL,
  n_rows INT UNSIGNED NOT NULL,
  PRIMARY KEY (set_id, frame_id),
  KEY ix_measurement_set_frames_frame (frame_id),
  CONSTRAINT fk_measurement_set_frames_set FOREIGN KEY (set_id) REFERENCES measurement_sets (id),
  CONSTRAINT fk_measurement_set_frames_frame FOREIGN KEY (frame_id) REFERENCES frames (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS measurement_set_frames');
