import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Root mean squared error.
 *
 * √(Σ(y − ŷ)²/n). Shapes: `label`, `predicted` n; result in the label's unit. Mutates nothing.
 * Returns null for n = 0 or where the sum leaves the range of doubles. Throws EngineError on unequal lengths or values that are not finite.
 * Cost: one pass. Source: definition.
 */
export function rmse(label: ArrayLike<number>, predicted: ArrayLike<number>): number | null {
  const n = label.length;
  requireNumbers('The label', label);
  requireNumbers('The prediction', predicted, n);
  if (n === 0) return null;
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const e = label[i] - predicted[i];
    sum += e * e;
  }
  const value = Math.sqrt(sum / n);
  return Number.isFinite(value) ? value : null;
}
