import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomUniform } from '@/lib/engine/random/random-uniform';

/**
 * A Poisson count with mean `mean` ≥ 0, by multiplying uniforms (Knuth, The Art of Computer Programming 2, 3.4.1),
 * in steps of at most 500 so that exp(−mean) never underflows. Cost O(mean). Advances `generator`.
 */
export function randomPoisson(generator: RandomGenerator, mean: number): number {
  let count = 0;
  let left = mean;
  while (left > 0) {
    const step = Math.min(left, 500);
    left -= step;
    const limit = Math.exp(-step);
    let product = randomUniform(generator);
    while (product > limit) {
      count++;
      product *= randomUniform(generator);
    }
  }
  return count;
}
