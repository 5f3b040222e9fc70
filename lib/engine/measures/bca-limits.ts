import normalCdf from '@stdlib/stats-base-dists-normal-cdf';
import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import { quantileOfSorted } from '@/lib/engine/measures/quantile-of-sorted';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** Both ends of a BCa interval and the two corrections it used. */
export interface BcaLimits {
  low: number;
  high: number;
  biasCorrection: number;
  acceleration: number;
}

/**
 * Ends of the bias-corrected and accelerated bootstrap interval, from replicates that were drawn elsewhere.
 *
 * z₀ = Φ⁻¹(share of replicates below the observed value, ties counted half);
 * α(z) = Φ(z₀ + (z₀ + z)/(1 − a(z₀ + z))) at z = ±Φ⁻¹((1 + level)/2); ends = type-7 quantiles of the replicates at α.
 * The share is held within [1/(2B), 1 − 1/(2B)], so that z₀ stays finite; where 1 − a(z₀ + z) ≤ 0 the end is the
 * outermost replicate on that side.
 * Shapes: `replicates` B ≥ 2 finite values. Unit: the statistic's. Mutates nothing.
 * Throws EngineError for B < 2, values that are not finite or a level outside (0, 1). Cost: B log B.
 * Source: Efron, J. Am. Stat. Assoc. 1987.
 */
export function bcaLimits(
  observed: number,
  replicates: ArrayLike<number>,
  acceleration: number,
  level = 0.95,
): BcaLimits {
  requireLevel(level);
  requireNumbers('The observed value and its acceleration', [observed, acceleration]);
  requireNumbers('A replicate', replicates);
  const draws = replicates.length;
  if (draws < 2) throw new EngineError('notEstimable', 'A bootstrap interval needs at least 2 replicates');
  const sorted = Float64Array.from(replicates).sort();
  let below = 0;
  for (let b = 0; b < draws; b += 1) {
    if (sorted[b] < observed) below += 1;
    else if (sorted[b] === observed) below += 0.5;
  }
  const share = Math.min(1 - 0.5 / draws, Math.max(0.5 / draws, below / draws));
  const z0 = normalQuantile(share, 0, 1);
  const z = normalQuantile(0.5 + level / 2, 0, 1);
  const end = (side: number): number => {
    const shifted = z0 + side;
    const scale = 1 - acceleration * shifted;
    if (scale <= 0) return shifted > 0 ? 1 : 0;
    return normalCdf(z0 + shifted / scale, 0, 1);
  };
  return {
    low: quantileOfSorted(sorted, end(-z)),
    high: quantileOfSorted(sorted, end(z)),
    biasCorrection: z0,
    acceleration,
  };
}
