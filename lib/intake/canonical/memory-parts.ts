import type { PartSource } from '@/lib/intake/canonical/part-source';
import type { CanonicalPart } from '@/lib/intake/canonical/write-canonical-to';

/** Parts that are already in memory, as a source to read from. */
export function memoryParts(parts: readonly CanonicalPart[]): PartSource {
  const bytesByName = new Map(parts.map((part) => [part.name, part.bytes]));
  return {
    parts: parts.map(({ bytes: _bytes, ...record }) => record),
    read: (name, offset, length) => {
      const bytes = bytesByName.get(name);
      if (bytes === undefined) throw new Error(`there is no part ${name}`);
      return Promise.resolve(bytes.subarray(offset, offset + length));
    },
  };
}
