import 'server-only';
import { randomBytes } from 'node:crypto';

const alphabet = '0123456789abcdefghjkmnpqrstvwxyz';

/** A new opaque public id: 60 random bits in letters that are not mistaken for each other. */
export function newPublicId(): string {
  return Array.from(randomBytes(12), (byte) => alphabet[byte & 31]).join('');
}
