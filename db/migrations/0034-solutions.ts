import type { Migration } from '../migrate';

/** One fit: asked, solved, proposed, decided. Nothing of it changes once it is approved but its state. */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS solutions (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  night_id INT UNSIGNED NOT NULL,
  number SMALLINT UNSIGNED NOT NULL COMMENT 'within its night, from 1',
  state VARCHAR(16) NOT NULL DEFAULT 'draft',
  model JSON NOT NULL COMMENT 'bands, terms, priors, airmass formula, limits: everything that was asked',
  inputs JSON NOT NULL COMMENT 'measurement sets with their SHA-256, nights, standards source, equipment epoch',
  input_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL COMMENT 'SHA-256 of the observations as the fit saw them',
  software_version VARCHAR(32) NOT NULL,
  outcome VARCHAR(16) NULL COMMENT 'determined, undetermined; null until solved',
  findings JSON NULL,
  evidence JSON NULL,
  suggested_verdict VARCHAR(24) NULL,
  verdict VARCHAR(24) NULL,
  follows_id INT UNSIGNED NULL COMMENT 'the solution this one was made from',
  superseded_by_id INT UNSIGNED NULL,
  version INT UNSIGNED NOT NULL DEFAULT 1,
  created_by_id INT UNSIGNED NOT NULL,
  solved_at DATETIME(3) NULL,
  proposed_by_id INT UNSIGNED NULL,
  proposed_at DATETIME(3) NULL,
  approved_by_id INT UNSIGNED NULL,
  approved_at DATETIME(3) NULL,
  withdrawn_by_id INT UNSIGNED NULL,
  withdrawn_at DATETIME(3) NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_solutions_public_id (public_id),
  UNIQUE KEY uq_solutions_number (night_id, number),
  KEY ix_solutions_state (state),
  CONSTRAINT fk_solutions_night FOREIGN KEY (night_id) REFERENCES nights (id),
  CONSTRAINT fk_solutions_follows FOREIGN KEY (follows_id) REFERENCES solutions (id),
  CONSTRAINT fk_solutions_superseded_by FOREIGN KEY (superseded_by_id) REFERENCES solutions (id),
  CONSTRAINT fk_solutions_creator FOREIGN KEY (created_by_id) REFERENCES people (id),
  CONSTRAINT fk_solutions_proposer FOREIGN KEY (proposed_by_id) REFERENCES people (id),
  CONSTRAINT fk_solutions_approver FOREIGN KEY (approved_by_id) REFERENCES people (id),
  CONSTRAINT fk_solutions_withdrawer FOREIGN KEY (withdrawn_by_id) REFERENCES people (id),
  CONSTRAINT ck_solutions_state CHECK (state IN ('draft','proposed','approved','superseded','withdrawn')),
  CONSTRAINT ck_solutions_verdict CHECK ((verdict IS NULL OR verdict IN ('photometric','usable with care','not photometric')) AND (suggested_verdict IS NULL OR suggested_verdict IN ('photometric','usable with care','not photometric'))),
  CONSTRAINT ck_solutions_outcome CHECK (outcome IS NULL OR outcome IN ('determined','undetermined'))
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS solutions');
