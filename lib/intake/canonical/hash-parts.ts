import { createHash } from 'node:crypto';

/** The data hash: SHA-256 (hex) over one line `<name> <sha256>` a part, in the order in which the parts are written. */
export function hashParts(parts: readonly { name: string; sha256: string }[]): string {
  const hash = createHash('sha256');
  for (const part of parts) hash.update(`${part.name} ${part.sha256}\n`);
  return hash.digest('hex');
}
