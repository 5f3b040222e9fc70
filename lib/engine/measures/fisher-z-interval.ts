import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';

/**
 * Interval of a correlation by Fisher's z.
 *
 * tanh(artanh r ± z₍(1+level)/2₎/√(n − 3)).
 * Shapes: r in [−1, 1], n the number of (effective) pairs. Range [−1, 1]. Mutates nothing.
 * Returns null for n ≤ 3 or |r| = 1. Throws EngineError for r outside [−1, 1] or a level outside (0, 1). Cost: constant.
 * Source: Fisher, Metron 1921.
 */
export function fisherZInterval(r: number, n: number, level = 0.95): Interval | null {
  requireLevel(level);
  if (!(r >= -1 && r <= 1)) {
    throw new EngineError('invalidOption', `A correlation lies between −1 and 1, not at ${r}`);
  }
  if (!(n > 3) || !Number.isFinite(n) || Math.abs(r) === 1) return null;
  const half = normalQuantile(0.5 + level / 2, 0, 1) / Math.sqrt(n - 3);
  const z = Math.atanh(r);
  return { low: Math.tanh(z - half), high: Math.tanh(z + half), level, method: 'Fisher z' };
}
