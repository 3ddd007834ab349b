import 'server-only';
import { createHash, randomBytes } from 'node:crypto';

/** 32 bytes: 256 random bits, which nobody guesses, so that a plain SHA-256 of them is safe to keep. */
const secret_bytes = 32;

/** A new secret for a token or a link, safe in addresses and headers. Shown once, kept only as its hash. */
export function newSecret(prefix = ''): string {
  return prefix + randomBytes(secret_bytes).toString('base64url');
}

/** What the database keeps of a random secret. Not for passwords: people do not choose them at random. */
export function secretHash(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}
