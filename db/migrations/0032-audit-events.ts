import type { Migration } from '../migrate';

/** Who did what to what, with the values before and after. Only ever added to. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS audit_events (
  id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  utc DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  person_id INT UNSIGNED NULL,
  act VARCHAR(48) NOT NULL,
  subject_kind VARCHAR(32) NOT NULL,
  subject_id VARCHAR(64) NOT NULL COMMENT 'public id',
  night_id INT UNSIGNED NULL,
  programme_id INT UNSIGNED NULL,
  reason VARCHAR(500) NOT NULL DEFAULT '',
  before_values JSON NULL,
  after_values JSON NULL,
  request_id VARCHAR(64) NOT NULL DEFAULT '',
  KEY ix_audit_events_subject (subject_kind, subject_id, id),
  KEY ix_audit_events_night (night_id, id),
  KEY ix_audit_events_programme (programme_id, id),
  KEY ix_audit_events_person (person_id, id),
  CONSTRAINT fk_audit_events_person FOREIGN KEY (person_id) REFERENCES people (id),
  CONSTRAINT fk_audit_events_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_audit_events_programme FOREIGN KEY (programme_id) REFERENCES programmes (id)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS audit_events');
