import { EngineError } from '@/lib/engine/engine-error';
import type { TransformedEstimate } from '@/lib/engine/group/fisher-z-delta';

/**
 * A z for held-out R² that has a value for negative R² too: the logarithm of the error that the training mean makes over the
 * readout's error, with its variance by the delta method.
 *
 * z = −½ ln(1 − R²) = ln(RMSE of the training mean/RMSE of the readout), var z = se²/(4(1 − R²)²).
 * Shapes: R² ≤ 1, se ≥ 0. Mutates nothing. Returns null for R² = 1. Throws EngineError outside these ranges.
 * Cost: constant. Source: delta method.
 */
export function logErrorRatioDelta(r2: number, standardError: number): TransformedEstimate | null {
  if (!(r2 <= 1) || !Number.isFinite(r2) || !(standardError >= 0) || !Number.isFinite(standardError)) {
    throw new EngineError(
      'invalidOption',
      `R² = ${r2} with standard error ${standardError} is no held-out R²`,
    );
  }
  if (r2 === 1) return null;
  const estimate = -0.5 * Math.log(1 - r2);
  const variance = (standardError / (2 * (1 - r2))) ** 2;
  return Number.isFinite(variance) ? { estimate, variance } : null;
}
