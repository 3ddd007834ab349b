import { starKey } from './star-name';

/** A standard field's name in an address: its key, with a full stop for whatever an address would have to escape. */
export function fieldSlug(field: string): string {
  return starKey(field).replace(/[^a-z0-9+]/g, '.');
}
