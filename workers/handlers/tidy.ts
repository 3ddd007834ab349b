import { removeExpired } from '@/lib/server/acts/remove-expired';
import type { Handler } from '../handler';

/** Removes expired sessions, idempotency keys, sign-in failures and the housekeeping's own old jobs. */
export const tidy: Handler<'tidy'> = ({ caller }) => removeExpired(caller);
