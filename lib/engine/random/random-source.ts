import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import type { RandomSource } from '@/lib/engine/measures/random-source';
import { randomInteger } from '@/lib/engine/random/random-integer';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { randomUniform } from '@/lib/engine/random/random-uniform';

/** A generator in the form that the statistics take. Every call advances `generator`. */
export function randomSource(generator: RandomGenerator): RandomSource {
  return {
    uniform: () => randomUniform(generator),
    integer: (maxExclusive) => randomInteger(generator, maxExclusive),
    normal: () => randomNormal(generator),
  };
}
