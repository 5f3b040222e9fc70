import type { RecipeInput } from '@/lib/contracts/recipe';
import { formatCount } from '@/lib/format/format-count';

/** What a recipe has computed, as a product: "1 000 shuffles × 5 folds × 25 penalties". */
export function workWords(recipe: RecipeInput): string {
  const { folds, estimator, null: scheme } = recipe;
  const parts: string[] = [];
  if (scheme && scheme.kind !== 'none' && scheme.draws) parts.push(`${formatCount(scheme.draws)} shuffles`);
  if (folds?.k) parts.push(`${formatCount(folds.k * (folds.repeats ?? 1))} folds`);
  if (estimator?.kind === 'ridge' && estimator.penalty && 'choose' in estimator.penalty)
    parts.push(`${formatCount(estimator.penalty.grid?.count ?? 25)} penalties`);
  return parts.length > 0 ? parts.join(' × ') : 'one fit a fold';
}
