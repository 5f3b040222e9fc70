import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomInteger } from '@/lib/engine/random/random-integer';

/**
 * `size` of the numbers 0…count−1, uniformly at random without replacement, ascending.
 * Cost O(count). Advances `generator`.
 */
export function randomSubset(count: number, size: number, generator: RandomGenerator): Int32Array {
  const pool = Int32Array.from({ length: count }, (_, i) => i);
  for (let i = 0; i < size; i++) {
    const j = i + randomInteger(generator, count - i);
    const kept = pool[i];
    pool[i] = pool[j];
    pool[j] = kept;
  }
  return pool.slice(0, size).sort();
}
