import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomUniform } from '@/lib/engine/random/random-uniform';

/** A standard normal number by the transform of Box & Muller (Ann. Math. Stat. 1958). Advances `generator`. */
export function randomNormal(generator: RandomGenerator): number {
  const u = 1 - randomUniform(generator);
  const v = randomUniform(generator);
  return Math.sqrt(-2 * Math.log(u)) * Math.cos(2 * Math.PI * v);
}
