import type { Migration } from '../migrate';

/** Outbox: written with the change that causes it, sent later, once. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS mails (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  kind VARCHAR(32) NOT NULL,
  dedupe_key VARCHAR(160) NOT NULL COMMENT 'one cause and one recipient: one mail',
  message_id VARCHAR(160) CHARACTER SET ascii NOT NULL,
  recipient VARCHAR(254) NOT NULL,
  person_id INT UNSIGNED NULL,
  subject VARCHAR(200) NOT NULL,
  text MEDIUMTEXT NOT NULL,
  html MEDIUMTEXT NOT NULL,
  state VARCHAR(16) NOT NULL DEFAULT 'queued',
  tries SMALLINT UNSIGNED NOT NULL DEFAULT 0,
  next_try_at DATETIME(3) NOT NULL,
  last_error VARCHAR(500) NOT NULL DEFAULT '',
  sent_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_mails_public_id (public_id),
  UNIQUE KEY uq_mails_dedupe (dedupe_key),
  UNIQUE KEY uq_mails_message_id (message_id),
  KEY ix_mails_due (state, next_try_at),
  CONSTRAINT fk_mails_person FOREIGN KEY (person_id) REFERENCES people (id),
  CONSTRAINT ck_mails CHECK (state IN ('queued','sent','failed'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS mails');
