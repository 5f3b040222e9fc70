import { EngineError } from '@/lib/engine/engine-error';
import { requireEstimates } from '@/lib/engine/group/require-estimates';

/** A weighted mean and the sums that follow from its weights 1/(v + τ²). */
export interface WeightedMean {
  mean: number;
  /** 1/√Σw. */
  standardError: number;
  /** Σw(y − mean)². */
  weightedSquares: number;
  /** Each estimate's share; they sum to 1. */
  shares: Float64Array;
}

/**
 * Inverse-variance weighted mean at a given variance between estimates.
 *
 * w = 1/(v + τ²), mean = Σwy/Σw, se = 1/√Σw; τ² = 0 is the fixed-effect mean, whose Σw(y − mean)² is Cochran's Q.
 * Shapes: `estimates`, `variances` k ≥ 1, variances > 0. Mutates nothing. Throws EngineError otherwise, or for τ² < 0.
 * Cost: three passes. Source: Cochran, Biometrics 1954.
 */
export function weightedMean(
  estimates: ArrayLike<number>,
  variances: ArrayLike<number>,
  tau2 = 0,
): WeightedMean {
  requireEstimates(estimates, variances);
  const k = estimates.length;
  if (k === 0) throw new EngineError('notEstimable', 'A mean needs at least one estimate');
  if (!(tau2 >= 0))
    throw new EngineError('invalidOption', `A variance between estimates of ${tau2} is negative`);
  const shares = new Float64Array(k);
  let total = 0;
  for (let i = 0; i < k; i += 1) {
    shares[i] = 1 / (variances[i] + tau2);
    total += shares[i];
  }
  let mean = 0;
  for (let i = 0; i < k; i += 1) mean += (shares[i] / total) * estimates[i];
  let weightedSquares = 0;
  for (let i = 0; i < k; i += 1) weightedSquares += shares[i] * (estimates[i] - mean) ** 2;
  for (let i = 0; i < k; i += 1) shares[i] /= total;
  return { mean, standardError: 1 / Math.sqrt(total), weightedSquares, shares };
}
