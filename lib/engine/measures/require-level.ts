import { EngineError } from '@/lib/engine/engine-error';

/**
 * Checks an interval's level. Must lie strictly between 0 and 1. Mutates nothing; throws EngineError `invalidOption`.
 * Cost: constant.
 */
export function requireLevel(level: number): void {
  if (!(level > 0 && level < 1)) {
    throw new EngineError('invalidOption', `An interval's level must lie between 0 and 1, not ${level}`);
  }
}
