import tQuantile from '@stdlib/stats-base-dists-t-quantile';
import type { Interval } from '@/lib/engine/measures/interval';
import { mean } from '@/lib/engine/measures/mean';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import { variance } from '@/lib/engine/measures/variance';

/**
 * Student's t interval of a mean.
 *
 * x̄ ± t₍n−1₎(1 − α/2)·s/√n. Shapes: `values` n; `level` in (0, 1). Unit: that of `values`. Mutates nothing.
 * Returns null for n < 2. Throws EngineError when a value is not finite or the level lies outside (0, 1).
 * Cost: five passes. Source: Student, Biometrika 1908.
 */
export function meanInterval(values: ArrayLike<number>, level = 0.95): Interval | null {
  requireNumbers('A value', values);
  requireLevel(level);
  const centre = mean(values);
  const s2 = variance(values);
  if (centre === null || s2 === null) return null;
  const half = tQuantile(0.5 + level / 2, values.length - 1) * Math.sqrt(s2 / values.length);
  if (!Number.isFinite(half)) return null;
  return { low: centre - half, high: centre + half, level, method: 't interval of the mean' };
}
