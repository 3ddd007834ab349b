import type { Migration } from '../migrate';

/** An entry of time lost has an address in the HTTP interface, so it needs an id that may leave the server. */
export const up: Migration = async ({ run }) => {
  await run(`
ALTER TABLE time_losses
  ADD COLUMN IF NOT EXISTS public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NULL AFTER id
`);
  // Letters of lib/server/data/public-id.ts; rows from before get ids as hard to guess as later ones.
  const letter = `SUBSTR('0123456789abcdefghjkmnpqrstvwxyz', 1 + FLOOR(RAND() * 32), 1)`;
  await run(
    `UPDATE time_losses SET public_id = CONCAT(${Array(12).fill(letter).join(', ')}) WHERE public_id IS NULL`,
  );
  await run(`
ALTER TABLE time_losses
  MODIFY COLUMN public_id CHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
  ADD UNIQUE KEY IF NOT EXISTS uq_time_losses_public_id (public_id)
`);
};

export const down: Migration = ({ run }) => run('ALTER TABLE time_losses DROP COLUMN IF EXISTS public_id');
