import type { Migration } from '../migrate';

/** One row: whose installation this is, and its rules (settings by lib/contracts/settings). */
export const up: Migration = ({ run }) =>
  run(`
CREATE TABLE IF NOT EXISTS observatories (
  id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  name VARCHAR(120) NOT NULL,
  is_demo BOOLEAN NOT NULL DEFAULT FALSE,
  settings JSON NOT NULL,
  created_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
  UNIQUE KEY uq_observatories_name (name)
) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci
`);

export const down: Migration = ({ run }) => run('DROP TABLE IF EXISTS observatories');
