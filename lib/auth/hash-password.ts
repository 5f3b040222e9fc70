import argon2 from 'argon2';
import { passwordParameters } from './password-parameters';

/** A salted argon2id hash in PHC form. The password is taken in Unicode form NFKC, so that keyboards agree. */
export async function hashPassword(password: string): Promise<string> {
  return argon2.hash(password.normalize('NFKC'), passwordParameters);
}
