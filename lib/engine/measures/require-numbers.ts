import { EngineError } from '@/lib/engine/engine-error';

/**
 * Checks once, at an exported edge, that an array holds `length` finite numbers.
 *
 * Shapes: `values` of any length; `length` is what it must have (left out = any).
 * Mutates nothing. Throws EngineError `shapeMismatch` or `notFinite` (with the first bad index as the trial).
 * Cost: one pass.
 */
export function requireNumbers(name: string, values: ArrayLike<number>, length?: number): void {
  if (length !== undefined && values.length !== length) {
    throw new EngineError('shapeMismatch', `${name} has ${values.length} values where ${length} are needed`);
  }
  for (let i = 0; i < values.length; i += 1) {
    if (!Number.isFinite(values[i])) {
      throw new EngineError('notFinite', `${name} is not a finite number at row ${i + 1}`, { trial: i });
    }
  }
}
