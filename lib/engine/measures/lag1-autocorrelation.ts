import { mean } from '@/lib/engine/measures/mean';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Lag-1 autocorrelation of a sequence.
 *
 * Σᵢ(xᵢ − x̄)(xᵢ₊₁ − x̄) / Σᵢ(xᵢ − x̄)².
 * Shapes: `values` n in their order of time. Range (−1, 1). Mutates nothing. Returns null when n < 2 or the sequence
 * is constant to working precision. Throws EngineError when a value is not finite. Cost: three passes.
 * Source: the definition that NIST's univariate reference sets certify (StRD).
 */
export function lag1Autocorrelation(values: ArrayLike<number>): number | null {
  requireNumbers('The sequence', values);
  const n = values.length;
  const centre = mean(values);
  if (centre === null || n < 2) return null;
  let squares = 0;
  let products = 0;
  let scale = 0;
  for (let i = 0; i < n; i += 1) {
    const d = values[i] - centre;
    squares += d * d;
    if (i + 1 < n) products += d * (values[i + 1] - centre);
    scale = Math.max(scale, Math.abs(values[i]));
  }
  const rounding = 4 * Number.EPSILON * scale;
  if (squares <= n * rounding * rounding) return null;
  const value = products / squares;
  return Number.isFinite(value) ? value : null;
}
