import { EngineError } from '@/lib/engine/engine-error';

/**
 * One type-7 quantile of values that are already in ascending order.
 *
 * h = (n − 1)p; Q = x₍⌊h⌋₎ + (h − ⌊h⌋)(x₍⌊h⌋₊₁₎ − x₍⌊h⌋₎), order statistics from 0.
 * Shapes: `sorted` n ≥ 1 ascending and finite; `p` in [0, 1]. Mutates nothing.
 * Throws EngineError for an empty array or p outside [0, 1]. Cost: constant. Source: Hyndman & Fan, Am. Stat. 1996.
 */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number): number {
  const n = sorted.length;
  if (n === 0) throw new EngineError('notEstimable', 'A quantile needs at least one value');
  if (!(p >= 0 && p <= 1)) {
    throw new EngineError('invalidOption', `A probability must lie between 0 and 1, not ${p}`);
  }
  const h = (n - 1) * p;
  const lower = Math.floor(h);
  const upper = Math.min(n - 1, lower + 1);
  return sorted[lower] + (h - lower) * (sorted[upper] - sorted[lower]);
}
