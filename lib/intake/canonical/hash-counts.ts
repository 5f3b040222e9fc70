import { createHash } from 'node:crypto';
import type { CountsArray } from '@/lib/intake/counts-array';

const SLAB = 1 << 16;

/**
 * SHA-256 (hex) over the shape (three numbers) and then the counts, row-major trials × units × bins, all as
 * little-endian int32; the same counts give the same hash whatever the file's format and type.
 * Assumes a little-endian machine, like the canonical form's writer.
 */
export function hashCounts(counts: CountsArray, shape: readonly [number, number, number]): string {
  const hash = createHash('sha256');
  hash.update(new Uint8Array(Int32Array.from(shape).buffer));
  const slab = new Int32Array(SLAB);
  for (let from = 0; from < counts.length; from += SLAB) {
    const part = counts.subarray(from, Math.min(from + SLAB, counts.length));
    slab.set(part);
    hash.update(new Uint8Array(slab.buffer, 0, part.length * 4));
  }
  return hash.digest('hex');
}
