import type { Recipe } from '@/lib/contracts/recipe';
import { formatCount } from '@/lib/format/format-count';
import { recipeWords } from '@/lib/services/readouts/recipe-words';

/** A recipe in one line for lists: estimator, window, folds, shuffles, and what differs from the plain case. */
export function recipeLine(recipe: Recipe): string {
  const { window, features, transform, nuisance, controls, trials, units } = recipe;
  const parts = [
    recipeWords.estimator(recipe),
    `${window.startMs} to ${window.endMs} ms`,
    ...(features === 'bins' ? ['each bin a feature'] : []),
    ...(transform === 'sqrt' ? ['square root'] : []),
    ...('all' in trials ? [] : ['some trials']),
    ...('all' in units ? [] : ['some units']),
    recipeWords.folds(recipe),
    ...(nuisance.handling === 'adjust'
      ? [`adjusted for ${nuisance.columns.map(({ column }) => column).join(', ')}`]
      : []),
    recipe.null.kind === 'none'
      ? 'no shuffles'
      : `${formatCount(recipe.null.draws ?? 0)} shuffles ${recipeWords.shuffle(recipe)}`.trim(),
    ...(controls.length > 0 ? [`${controls.length} ${controls.length === 1 ? 'control' : 'controls'}`] : []),
  ];
  return parts.join(', ');
}
