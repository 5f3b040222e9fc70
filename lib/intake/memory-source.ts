import type { ByteSource } from '@/lib/intake/byte-source';

/** Bytes in memory as a source; each read is a copy, as from a store. */
export function memorySource(bytes: Uint8Array): ByteSource {
  const readSync = (offset: number, length: number): Uint8Array => {
    if (offset < 0 || length < 0 || offset + length > bytes.byteLength)
      throw new RangeError(`bytes ${offset} to ${offset + length} of ${bytes.byteLength}`);
    return bytes.slice(offset, offset + length);
  };
  return { sizeBytes: bytes.byteLength, readSync, read: async (offset, length) => readSync(offset, length) };
}
