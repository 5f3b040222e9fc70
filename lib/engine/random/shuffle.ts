import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomInteger } from '@/lib/engine/random/random-integer';

/** Puts `items` into a uniformly random order, in place (Fisher & Yates; Durstenfeld, CACM 1964). Advances `generator`. */
export function shuffle(items: Int32Array | Float64Array | number[], generator: RandomGenerator): void {
  for (let i = items.length - 1; i > 0; i--) {
    const j = randomInteger(generator, i + 1);
    const kept = items[i];
    items[i] = items[j];
    items[j] = kept;
  }
}
