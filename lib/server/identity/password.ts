import 'server-only';
import { hash, verify } from '@node-rs/argon2';
import { newSecret } from './secrets';

/**
 * argon2id with 19 MiB, two passes, one lane: the first of the equal settings of the OWASP Password Storage Cheat Sheet
 * (section Argon2id). The hash carries its own settings, so that older hashes stay valid when these are raised.
 */
const memory_KiB = 19_456;
const passes = 2;
const lanes = 1;
/** Algorithm.Argon2id of the package, a constant enum that isolated modules cannot read. */
const argon2id = 2;

export function hashPassword(password: string): Promise<string> {
  return hash(password.normalize('NFKC'), {
    algorithm: argon2id,
    memoryCost: memory_KiB,
    timeCost: passes,
    parallelism: lanes,
  });
}

let dummy: Promise<string> | undefined;

/**
 * Whether the password belongs to the hash. Without one (no such account, or no password yet) it computes just as long
 * against a hash that nothing matches: the time of the answer does not tell which addresses have accounts.
 */
export async function passwordMatches(stored: string | null, password: string): Promise<boolean> {
  dummy ??= hashPassword(newSecret());
  const matches = await verify(stored ?? (await dummy), password.normalize('NFKC'));
  return stored !== null && matches;
}
