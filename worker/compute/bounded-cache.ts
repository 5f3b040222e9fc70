import type { ChunkCache } from '@/lib/engine/readout/types';

/** Intermediate results of one thread within `maxBytes`: what was used least recently goes first. */
export function boundedCache(maxBytes: number): ChunkCache {
  const entries = new Map<string, { value: unknown; bytes: number }>();
  let heldBytes = 0;
  return {
    get(key) {
      const entry = entries.get(key);
      if (!entry) return undefined;
      entries.delete(key);
      entries.set(key, entry); // a Map keeps insertion order: the front is the least recently used
      return entry.value;
    },
    set(key, value, bytes) {
      heldBytes -= entries.get(key)?.bytes ?? 0;
      entries.delete(key);
      entries.set(key, { value, bytes });
      heldBytes += bytes;
      for (const [oldest, entry] of entries) {
        if (heldBytes <= maxBytes || oldest === key) break;
        entries.delete(oldest);
        heldBytes -= entry.bytes;
      }
    },
  };
}
