import { midranks } from '@/lib/engine/measures/midranks';
import { pearson } from '@/lib/engine/measures/pearson';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Spearman's rank correlation.
 *
 * ρ = Pearson's r of the midranks.
 * Shapes: `x`, `y` n. Range [−1, 1]. Mutates nothing. Returns null when n < 2 or either is constant.
 * Throws EngineError on unequal lengths or values that are not finite. Cost: n log n.
 * Source: Spearman, Am. J. Psychol. 1904; ties by midranks.
 */
export function spearman(x: ArrayLike<number>, y: ArrayLike<number>): number | null {
  requireNumbers('The first variable', x);
  requireNumbers('The second variable', y, x.length);
  return pearson(midranks(x), midranks(y));
}
