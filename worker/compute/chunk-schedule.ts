import type { Chunk } from '@/lib/engine/readout/types';

/** Hands out chunks to threads. */
export interface ChunkSchedule {
  /** The next chunk for this thread, or null when all have been handed out. */
  next(thread: number): Chunk | null;
}

/**
 * A thread goes on with the chunks that share intermediate results with its last one; then it takes a group that
 * nobody has begun; then it helps with the group that has the most work left, from its end. The order never changes a
 * result, only the time.
 */
export function scheduleChunks(chunks: readonly Chunk[]): ChunkSchedule {
  const groups = new Map<string, { left: Chunk[]; weight: number; isTaken: boolean }>();
  for (const chunk of chunks) {
    const group = groups.get(chunk.affinity) ?? { left: [], weight: 0, isTaken: false };
    group.left.push(chunk);
    group.weight += chunk.weight;
    groups.set(chunk.affinity, group);
  }
  const current = new Map<number, string>();

  function take(thread: number, affinity: string, fromEnd: boolean): Chunk {
    const group = groups.get(affinity)!;
    const chunk = (fromEnd ? group.left.pop() : group.left.shift())!;
    group.weight -= chunk.weight;
    group.isTaken = true;
    if (group.left.length === 0) groups.delete(affinity);
    current.set(thread, affinity);
    return chunk;
  }
  return {
    next(thread) {
      const own = current.get(thread);
      if (own !== undefined && groups.has(own)) return take(thread, own, false);
      let helped: string | null = null;
      for (const [affinity, group] of groups) {
        if (!group.isTaken) return take(thread, affinity, false);
        if (helped === null || group.weight > groups.get(helped)!.weight) helped = affinity;
      }
      return helped === null ? null : take(thread, helped, true);
    },
  };
}
