import { dictionary } from '@zxcvbn-ts/language-common';

let known: Set<string> | undefined;

/** Passwords that leaked most often, in lower case: the list that zxcvbn-ts carries. */
export function commonPasswords(): ReadonlySet<string> {
  known ??= new Set(dictionary['passwords-common'].map((word) => word.toLowerCase()));
  return known;
}
