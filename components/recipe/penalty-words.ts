import type { EstimatorRecipe } from '@/lib/contracts/recipe';
import { formatValue } from '@/lib/format/format-value';

const rules = {
  leaveOneOut: 'closed-form leave-one-out',
  gcv: 'generalised cross-validation',
  innerFolds: 'inner folds',
} as const;

/** How a penalty or a number of components is come by: "chosen by closed-form leave-one-out"; empty for least squares. */
export function penaltyWords(estimator: EstimatorRecipe): string {
  if (estimator.kind === 'leastSquares') return '';
  const choice = estimator.kind === 'ridge' ? estimator.penalty : estimator.components;
  if ('value' in choice) return `fixed at ${formatValue(choice.value)}`;
  const rule =
    choice.choose === 'innerFolds' ? `${choice.innerFolds ?? 5} inner folds` : rules[choice.choose];
  return `chosen by ${rule}`;
}
