import { mean } from '@/lib/engine/measures/mean';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Pearson's product-moment correlation.
 *
 * r = Σ(x − x̄)(y − ȳ) / √(Σ(x − x̄)² Σ(y − ȳ)²), held within [−1, 1] against rounding.
 * Shapes: `x`, `y` n. Mutates nothing. Returns null when n < 2 or either is constant to working precision.
 * Throws EngineError on unequal lengths or values that are not finite. Cost: four passes.
 * Source: definition.
 */
export function pearson(x: ArrayLike<number>, y: ArrayLike<number>): number | null {
  const n = x.length;
  requireNumbers('The first variable', x);
  requireNumbers('The second variable', y, n);
  const mx = mean(x);
  const my = mean(y);
  if (mx === null || my === null || n < 2) return null;
  let sxx = 0;
  let syy = 0;
  let sxy = 0;
  let scaleX = 0;
  let scaleY = 0;
  for (let i = 0; i < n; i += 1) {
    const dx = x[i] - mx;
    const dy = y[i] - my;
    sxx += dx * dx;
    syy += dy * dy;
    sxy += dx * dy;
    scaleX = Math.max(scaleX, Math.abs(x[i]));
    scaleY = Math.max(scaleY, Math.abs(y[i]));
  }
  // A constant column leaves only the rounding of its own mean: that is no variance.
  const roundX = 4 * Number.EPSILON * scaleX;
  const roundY = 4 * Number.EPSILON * scaleY;
  if (sxx <= n * roundX * roundX || syy <= n * roundY * roundY) return null;
  const r = sxy / (Math.sqrt(sxx) * Math.sqrt(syy));
  if (!Number.isFinite(r)) return null;
  return Math.max(-1, Math.min(1, r));
}
