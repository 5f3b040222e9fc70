import argon2 from 'argon2';
import { hashPassword } from './hash-password';

let decoy: Promise<string> | undefined;

/**
 * Whether the password fits the hash. Without a hash (no such account, or one that cannot sign in by password) the
 * same work is done for nothing.
 */
export async function verifyPassword(password: string, hash: string | null): Promise<boolean> {
  decoy ??= hashPassword(crypto.randomUUID());
  const isHash = hash?.startsWith('$argon2') ?? false;
  const fits = await argon2.verify(isHash && hash !== null ? hash : await decoy, password.normalize('NFKC'));
  return isHash && fits;
}
