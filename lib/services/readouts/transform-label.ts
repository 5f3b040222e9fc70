import type { Recipe } from '@/lib/contracts/recipe';
import { transformLabels } from '@/lib/engine/label/transform-labels';

/**
 * The label under the recipe's fixed function, the same for every trial, so that nothing of a held-out trial enters it. A trial
 * whose label the function is not defined for (missing, at or below 0 under log, outside [0, 1] under logit) becomes NaN, which
 * drops it and counts it.
 */
export function transformLabel(
  values: Float64Array,
  { kind, epsilon = 0.001 }: Recipe['labelTransform'],
): Float64Array {
  const isDefined = (value: number): boolean =>
    Number.isFinite(value) && (kind === 'none' || (kind === 'log' ? value > 0 : value >= 0 && value <= 1));
  const transformed = transformLabels(
    values.filter(isDefined),
    kind === 'logit' ? { kind, epsilon } : { kind },
  );
  let next = 0;
  return values.map((value) => (isDefined(value) ? transformed[next++] : NaN));
}
