import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomUniform } from '@/lib/engine/random/random-uniform';

/** How many of `trials` independent chances of `probability` come true. Cost O(trials). Advances `generator`. */
export function randomBinomial(generator: RandomGenerator, trials: number, probability: number): number {
  let count = 0;
  for (let i = 0; i < trials; i++) if (randomUniform(generator) < probability) count++;
  return count;
}
