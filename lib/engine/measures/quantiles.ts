import { quantileOfSorted } from '@/lib/engine/measures/quantile-of-sorted';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Sample quantiles, type 7 (linear interpolation between order statistics).
 *
 * h = (n − 1)p; Q = x₍⌊h⌋₎ + (h − ⌊h⌋)(x₍⌊h⌋₊₁₎ − x₍⌊h⌋₎), order statistics from 0.
 * Shapes: `values` n, `probabilities` k in [0, 1] → k. Mutates nothing. An empty `values` gives null.
 * Throws EngineError when a value is not finite or a probability lies outside [0, 1]. Cost: n log n.
 * Source: Hyndman & Fan, Am. Stat. 1996, definition 7.
 */
export function quantiles(values: ArrayLike<number>, probabilities: readonly number[]): number[] | null {
  requireNumbers('A value', values);
  if (values.length === 0) return null;
  const sorted = Float64Array.from(values).sort();
  return probabilities.map((p) => quantileOfSorted(sorted, p));
}
