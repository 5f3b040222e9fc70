import { createHash } from 'node:crypto';
import type { PartSource } from '@/lib/intake/canonical/part-source';

/** All bytes of one part, checked against the part's hash; null if the data version has no such part. */
export async function readPart(source: PartSource, name: string): Promise<Uint8Array | null> {
  const record = source.parts.find((part) => part.name === name);
  if (record === undefined) return null;
  const bytes = await source.read(name, 0, record.sizeBytes);
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  if (sha256 !== record.sha256)
    throw new Error(`part ${name} does not have the hash that was recorded for it`);
  return bytes;
}
