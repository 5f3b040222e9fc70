import type { Chunk, ReadoutPlan } from '@/lib/engine/readout/types';

/** A part is meant to take about this long: long enough to load the data and factor the folds again. */
const partSeconds = 8;
const mostParts = 64;

/** Into how many parts a plan is split; 1 when it is not expected to take longer than `splitAboveSeconds`. */
export function partsFor(
  plan: Pick<ReadoutPlan, 'estimate' | 'chunks'>,
  threads: number,
  splitAboveSeconds: number,
): number {
  const seconds = plan.estimate.seconds / threads;
  if (seconds <= splitAboveSeconds) return 1;
  return Math.min(plan.chunks.length, mostParts, Math.max(4, Math.ceil(seconds / partSeconds)));
}

/**
 * Cuts a plan's chunks into parts of about the same work. Chunks that share intermediate results stay together where
 * that can be. The same chunks and number give the same parts on every machine.
 */
export function splitChunks(chunks: readonly Chunk[], parts: number): Chunk[][] {
  const groups = new Map<string, Chunk[]>();
  for (const chunk of chunks) {
    const group = groups.get(chunk.affinity);
    if (group) group.push(chunk);
    else groups.set(chunk.affinity, [chunk]);
  }
  const ordered = [...groups.values()].flat();
  const total = ordered.reduce((sum, { weight }) => sum + weight, 0) || 1;
  const split: Chunk[][] = Array.from({ length: parts }, () => []);
  let before = 0;
  for (const chunk of ordered) {
    // By the middle of the chunk, so that rounding never leaves the last part with everything.
    const part = Math.floor((parts * (before + chunk.weight / 2)) / total);
    split[Math.min(parts - 1, part)].push(chunk);
    before += chunk.weight;
  }
  return split;
}
