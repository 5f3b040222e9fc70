import type { Recipe } from '@/lib/contracts/recipe';

/**
 * A fixed function of the label, the same for every trial, so that nothing of a held-out trial enters it.
 * log: natural; NaN at or below 0. logit: ln(c / (1 − c)) of the value clipped to [ε, 1 − ε].
 */
export function transformLabel(
  values: Float64Array,
  { kind, epsilon = 0.001 }: Recipe['labelTransform'],
): Float64Array {
  if (kind === 'log') return values.map((value) => (value > 0 ? Math.log(value) : NaN));
  if (kind === 'logit')
    return values.map((value) => {
      const clipped = Math.min(1 - epsilon, Math.max(epsilon, value));
      return Math.log(clipped / (1 - clipped));
    });
  return values;
}
