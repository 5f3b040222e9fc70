import { createHash } from 'node:crypto';

/**
 * How a bearer token is kept. A plain SHA-256 is enough: the token is 256 random bits, so there is nothing to guess.
 */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
