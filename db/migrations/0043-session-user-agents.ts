import type { Migration } from '../migrate';

/** Which browser a session belongs to, so that its person can tell sessions apart. */
export const up: Migration = ({ run }) =>
  run(
    "ALTER TABLE sessions ADD COLUMN IF NOT EXISTS user_agent VARCHAR(255) NOT NULL DEFAULT '' AFTER expires_at",
  );

export const down: Migration = ({ run }) => run('ALTER TABLE sessions DROP COLUMN IF EXISTS user_agent');
