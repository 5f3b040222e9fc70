import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

/** A uniform number in [0, 1) with 53 random bits. Advances `generator` by two. */
export function randomUniform(generator: RandomGenerator): number {
  const high = generator.next() >>> 5;
  const low = generator.next() >>> 6;
  return (high * 67108864 + low) / 9007199254740992;
}
