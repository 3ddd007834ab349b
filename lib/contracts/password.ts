import type { Issue } from '@/lib/faults/fault';

/** Length protects; forced digits and signs do not (NIST SP 800-63B, section 5.1.1.2). */
export const passwordMin = 12;
/** More is only work for the server. */
export const passwordMax = 200;
const distinctMin = 5;

/** What the first guesses of every list are made of, without digits and signs. */
const commonWords = [
  'password',
  'passwort',
  'qwertyuiop',
  'letmein',
  'welcome',
  'iloveyou',
  'administrator',
  'changeme',
  'evenfall',
  'observatory',
  'telescope',
  'photometry',
];
const runs = ['abcdefghijklmnopqrstuvwxyz', '01234567890123456789', 'qwertyuiopasdfghjklzxcvbnm'];

/** Words of a name or an address that a password must not be made of. */
const ownWords = (texts: readonly string[]): readonly string[] =>
  texts.flatMap((text) => text.toLowerCase().split(/[^\p{L}\p{N}]+/u)).filter((word) => word.length >= 4);

/** What is left of the password when the word is taken out, as often as it stands there. */
const without = (password: string, word: string): string => password.split(word).join('');

const isRun = (password: string): boolean =>
  runs.some((run) => {
    const backwards = [...run].reverse().join('');
    return `${run}${run}`.includes(password) || `${backwards}${backwards}`.includes(password);
  });

/** Everything that is wrong with a new password, as sentences; empty when it will do. */
export function passwordProblems(password: string, own: readonly string[]): readonly string[] {
  const problems: string[] = [];
  const plain = password.normalize('NFKC').toLowerCase();
  const length = [...plain].length;
  if (length < passwordMin) {
    problems.push(
      `It has ${length} characters; take at least ${passwordMin}. Several words in a row are fine.`,
    );
  }
  if (length > passwordMax) problems.push(`It is longer than ${passwordMax} characters.`);
  if (length >= passwordMin && new Set(plain).size < distinctMin) {
    problems.push(`It uses fewer than ${distinctMin} different characters.`);
  }
  if (length >= passwordMin && isRun(plain)) problems.push('It is a row of neighbouring letters or digits.');
  const enough = (rest: string): boolean => rest.replace(/[^\p{L}]/gu, '').length >= 4;
  const common = commonWords.find((word) => plain.includes(word) && !enough(without(plain, word)));
  if (common) problems.push(`It is little more than “${common}”, which is guessed first.`);
  const mine = ownWords(own).find((word) => plain.includes(word) && !enough(without(plain, word)));
  if (mine) problems.push(`It is little more than “${mine}”, which is in your name or address.`);
  return problems;
}

/** The same as issues of a form's field. */
export function passwordIssues(
  password: string,
  own: readonly string[],
  path = 'password',
): readonly Issue[] {
  return passwordProblems(password, own).map((message) => ({ path, message }));
}
