import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Held-out R², pooled over all held-out trials, against each trial's own training mean.
 *
 * R² = 1 − Σ(y − ŷ)² / Σ(y − ȳ_train)².
 * Shapes: `label`, `predicted`, `trainMean` n; `trainMean[i]` is the mean label of the training trials of the fold
 * that held trial i out. Range: (−∞, 1]; negative when worse than the training mean, never clipped.
 * Mutates nothing. Returns null when the denominator is 0 to working precision (every label equals its training mean) or n is 0.
 * Throws EngineError on unequal lengths or values that are not finite. Cost: one pass.
 * Source: cross-validated predictive R² (q²) with the training mean as the baseline, Consonni, Ballabio & Todeschini,
 * J. Chemom. 2010 (from memory).
 */
export function heldOutR2(
  label: ArrayLike<number>,
  predicted: ArrayLike<number>,
  trainMean: ArrayLike<number>,
): number | null {
  const n = label.length;
  requireNumbers('The label', label);
  requireNumbers('The prediction', predicted, n);
  requireNumbers('The training mean', trainMean, n);
  let error = 0;
  let baseline = 0;
  let scale = 0;
  for (let i = 0; i < n; i += 1) {
    const e = label[i] - predicted[i];
    const b = label[i] - trainMean[i];
    error += e * e;
    baseline += b * b;
    scale = Math.max(scale, Math.abs(label[i]));
  }
  // A constant label leaves only the rounding of its training means.
  const rounding = 4 * Number.EPSILON * scale;
  if (baseline <= n * rounding * rounding) return null;
  const r2 = 1 - error / baseline;
  return Number.isFinite(r2) ? r2 : null;
}
