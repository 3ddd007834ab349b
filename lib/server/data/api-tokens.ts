import 'server-only';
import { execute } from './database';

/** Notes that a token was used, at most once a minute: reading must not become writing. */
export async function touchToken(tokenId: number): Promise<void> {
  await execute(
    `UPDATE api_tokens SET last_used_at = NOW(3)
      WHERE id = :tokenId AND (last_used_at IS NULL OR last_used_at < NOW(3) - INTERVAL 1 MINUTE)`,
    { tokenId },
    null,
  );
}
