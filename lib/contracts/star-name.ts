/**
 * What two spellings of one star's name have in common: letters in lower case, without blanks and hyphens.
 * "SA 92-259" and "sa92 259" have the key "sa92259". Dashes that look like a hyphen count as one; a plus sign stays,
 * because it tells northern names from others.
 */
export function starKey(name: string): string {
  return name
    .normalize('NFKC')
    .toLowerCase()
    .replace(/[\s\p{Pd}\u2212]+/gu, '');
}
