import type { Chunk } from '@/lib/engine/readout/types';
import type { ComputeProgress } from '@/worker/compute/messages';

const total = 1_000;

/**
 * Tells how far the work is, by the chunks' estimated work. The time left comes from the speed so far, and is null
 * until that means something.
 */
export function progressMeter(chunks: readonly Chunk[], doneBefore: ReadonlySet<number>, now: () => number) {
  const weightOf = new Map(chunks.map((chunk) => [chunk.id, chunk.weight]));
  const sum = (ids: Iterable<number>) => [...ids].reduce((all, id) => all + (weightOf.get(id) ?? 0), 0);
  const all = sum(weightOf.keys()) || 1;
  const before = sum(doneBefore);
  const startedAt = now();
  let done = before;
  let phase = chunks[0]?.phase ?? 'Computing';
  return {
    begun(chunk: Chunk): void {
      phase = chunk.phase;
    },
    finished(id: number): void {
      done += weightOf.get(id) ?? 0;
    },
    read(): ComputeProgress {
      const seconds = (now() - startedAt) / 1_000;
      const share = (done - before) / all;
      const secondsLeft = seconds >= 0.5 && share >= 0.02 ? (seconds * (all - done)) / (done - before) : null;
      return { done: Math.min(total, Math.round((total * done) / all)), total, phase, secondsLeft };
    },
  };
}
