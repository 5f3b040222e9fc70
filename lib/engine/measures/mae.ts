import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Mean absolute error.
 *
 * Σ|y − ŷ|/n. Shapes: `label`, `predicted` n; result in the label's unit. Mutates nothing.
 * Returns null for n = 0 or where the sum leaves the range of doubles. Throws EngineError on unequal lengths or values that are not finite.
 * Cost: one pass. Source: definition.
 */
export function mae(label: ArrayLike<number>, predicted: ArrayLike<number>): number | null {
  const n = label.length;
  requireNumbers('The label', label);
  requireNumbers('The prediction', predicted, n);
  if (n === 0) return null;
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += Math.abs(label[i] - predicted[i]);
  const value = sum / n;
  return Number.isFinite(value) ? value : null;
}
