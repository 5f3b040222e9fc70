import { EngineError } from '@/lib/engine/engine-error';

/** Checks that every entry is a p value in [0, 1]. Mutates nothing; throws EngineError `invalidOption`. One pass. */
export function requirePValues(pValues: ArrayLike<number>): void {
  for (let i = 0; i < pValues.length; i += 1) {
    if (!(pValues[i] >= 0 && pValues[i] <= 1)) {
      throw new EngineError(
        'invalidOption',
        `Entry ${i + 1} is ${pValues[i]}, not a p value between 0 and 1`,
      );
    }
  }
}
