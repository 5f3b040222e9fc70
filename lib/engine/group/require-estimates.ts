import { EngineError } from '@/lib/engine/engine-error';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Checks estimates and their variances: same length, finite, variances positive. Mutates nothing; throws EngineError. One pass.
 */
export function requireEstimates(estimates: ArrayLike<number>, variances: ArrayLike<number>): void {
  requireNumbers('An estimate', estimates);
  requireNumbers('A variance', variances, estimates.length);
  for (let i = 0; i < variances.length; i += 1) {
    if (!(variances[i] > 0)) {
      throw new EngineError(
        'invalidOption',
        `The variance of estimate ${i + 1} is ${variances[i]}, not positive`,
      );
    }
  }
}
