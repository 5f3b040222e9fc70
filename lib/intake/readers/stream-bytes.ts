import type { ByteSource } from '@/lib/intake/byte-source';

const SLAB_BYTES = 2 * 1024 * 1024;

/** The bytes from `offset` to `end` in slabs of 2 MiB. */
export async function* streamBytes(
  source: ByteSource,
  offset: number,
  end: number,
): AsyncGenerator<Uint8Array, void, undefined> {
  for (let at = offset; at < end; at += SLAB_BYTES)
    yield await source.read(at, Math.min(SLAB_BYTES, end - at));
}
