import { commonPasswords } from './common-passwords';

/** Characters at least: NIST SP 800-63B-4, section 3.1.1.2, for a password that is the only factor. */
export const passwordMinCharacters = 15;
/** Characters at most: far above the 64 that the same section asks to allow, and short enough to hash quickly. */
export const passwordMaxCharacters = 256;

export interface PasswordFault {
  code: 'too-short' | 'too-long' | 'common' | 'about-you';
  detail: string;
}

/**
 * What is wrong with a new password, after NIST SP 800-63B-4, section 3.1.1.2: length counted in code points, a
 * blocklist of common and of context words, and no rule on its composition. Pure.
 *
 * @param context words that others could guess: the member's name and address, the lab, the product
 */
export function passwordFaults(password: string, context: readonly string[]): PasswordFault[] {
  const normal = password.normalize('NFKC');
  const length = [...normal].length;
  if (length < passwordMinCharacters)
    return [
      {
        code: 'too-short',
        detail: `it needs ${passwordMinCharacters} characters or more; a few words do well`,
      },
    ];
  if (length > passwordMaxCharacters)
    return [{ code: 'too-long', detail: `it may have ${passwordMaxCharacters} characters at most` }];
  const word = normal.toLowerCase();
  if (isCommon(word)) return [{ code: 'common', detail: 'it is among the passwords that are tried first' }];
  const letters = word.replaceAll(/[^\p{L}\p{N}]/gu, '');
  const parts = context
    .flatMap((text) =>
      text
        .toLowerCase()
        .normalize('NFKC')
        .split(/[^\p{L}\p{N}]+/u),
    )
    .filter((part) => part.length >= 3);
  const rest = parts
    .sort((a, b) => b.length - a.length)
    .reduce((text, part) => text.replaceAll(part, ''), letters);
  // What is left beside names and the like must be worth something by itself.
  if (rest.length < letters.length && [...rest].length < 8)
    return [
      { code: 'about-you', detail: 'it is little more than your name, address, lab or this product’s name' },
    ];
  return [];
}

function isCommon(word: string): boolean {
  const known = commonPasswords();
  const letters = word.replaceAll(/[^\p{L}\p{N}]/gu, '');
  const stem = word.replace(/[\d\W_]+$/u, '');
  return (
    [word, letters, stem].some((text) => text !== '' && known.has(text)) ||
    isRepeated(word) ||
    isSequence(letters)
  );
}

/** One short piece over and over: aaaa…, abcabcabc…, and a common password twice. */
function isRepeated(word: string): boolean {
  for (let period = 1; period <= Math.min(8, word.length / 2); period++)
    if ([...word].every((letter, at) => letter === word[at % period])) return true;
  const half = word.slice(0, word.length / 2);
  return half + half === word && commonPasswords().has(half);
}

/** Neighbours in the alphabet, in counting or on a keyboard's rows, forwards or backwards. */
function isSequence(word: string): boolean {
  const rows = [
    'abcdefghijklmnopqrstuvwxyz',
    '1234567890',
    'qwertyuiopasdfghjklzxcvbnm',
    'qwertzuiopasdfghjklyxcvbnm',
  ];
  const runs = rows.flatMap((row) => [row.repeat(3), [...row].reverse().join('').repeat(3)]);
  return word.length > 0 && runs.some((run) => run.includes(word));
}
