import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

/**
 * A uniform integer in 0…bound−1, exactly uniform (values beyond the largest multiple of `bound` are redrawn).
 * `bound` 1…2³². Advances `generator`.
 */
export function randomInteger(generator: RandomGenerator, bound: number): number {
  const limit = Math.floor(4294967296 / bound) * bound;
  let value = generator.next() >>> 0;
  while (value >= limit) value = generator.next() >>> 0;
  return value % bound;
}
