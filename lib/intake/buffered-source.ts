import type { ByteSource } from '@/lib/intake/byte-source';

const PAGE_BYTES = 256 * 1024;
const MAX_PAGES = 16;

/** A source that fetches small reads by pages and keeps the last few, so that a reader's many small steps cost few requests. */
export function bufferedSource(source: ByteSource): ByteSource {
  const pages = new Map<number, Promise<Uint8Array>>();
  const page = (at: number): Promise<Uint8Array> => {
    const known = pages.get(at);
    if (known !== undefined) {
      pages.delete(at);
      pages.set(at, known);
      return known;
    }
    const offset = at * PAGE_BYTES;
    const loading = source.read(offset, Math.min(PAGE_BYTES, source.sizeBytes - offset));
    pages.set(at, loading);
    loading.catch(() => pages.delete(at));
    if (pages.size > MAX_PAGES) pages.delete(pages.keys().next().value!);
    return loading;
  };
  return {
    sizeBytes: source.sizeBytes,
    ...(source.readSync
      ? { readSync: (offset: number, length: number) => source.readSync!(offset, length) }
      : {}),
    read: async (offset, length) => {
      if (offset < 0 || length < 0 || offset + length > source.sizeBytes)
        throw new RangeError(`bytes ${offset} to ${offset + length} of ${source.sizeBytes}`);
      if (length === 0) return new Uint8Array(0);
      if (length > PAGE_BYTES) return source.read(offset, length);
      const first = Math.floor(offset / PAGE_BYTES);
      const last = Math.floor((offset + length - 1) / PAGE_BYTES);
      const from = offset - first * PAGE_BYTES;
      const head = await page(first);
      if (first === last) return head.slice(from, from + length);
      const bytes = new Uint8Array(length);
      bytes.set(head.subarray(from));
      bytes.set((await page(last)).subarray(0, length - (head.length - from)), head.length - from);
      return bytes;
    },
  };
}
