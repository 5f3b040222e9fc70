import type { ByteSource } from '@/lib/intake/byte-source';

/** Bytes in memory as a source; each read is a copy, as from a store. */
export function memorySource(bytes: Uint8Array): ByteSource {
  return {
    sizeBytes: bytes.byteLength,
    read: (offset, length) => {
      if (offset < 0 || length < 0 || offset + length > bytes.byteLength)
        return Promise.reject(new RangeError(`bytes ${offset} to ${offset + length} of ${bytes.byteLength}`));
      return Promise.resolve(bytes.slice(offset, offset + length));
    },
  };
}
