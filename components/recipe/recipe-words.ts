import { conditionWords } from '@/components/recipe/condition-words';
import { estimatorWords } from '@/components/recipe/estimator-words';
import { foldsWords } from '@/components/recipe/folds-words';
import { labelWords } from '@/components/recipe/label-words';
import { nullWords } from '@/components/recipe/null-words';
import { penaltyWords } from '@/components/recipe/penalty-words';
import { unitsWords } from '@/components/recipe/units-words';
import type { LabelFact } from '@/lib/contracts/session';
import type { Recipe } from '@/lib/contracts/recipe';
import { formatNumber } from '@/lib/format/format-number';
import { formatPlural } from '@/lib/format/format-plural';

/** Numbers that a recipe alone does not hold; null where they are not known yet. */
export interface RecipeCounts {
  trialsUsed: number | null;
  unitsUsed: number | null;
}

const transforms = { none: '', sqrt: 'square-root ' } as const;

function theLabel(recipe: Recipe, kind: LabelFact['kind'] | undefined): string {
  const kindWord = kind === 'nominal' || kind === 'realised' ? `${kind} ` : '';
  const { labelTransform } = recipe;
  const after =
    labelTransform.kind === 'log'
      ? ', as its logarithm,'
      : labelTransform.kind === 'logit'
        ? `, as its logit after moving it ${labelTransform.epsilon ?? 0.001} inwards,`
        : '';
  return `The ${kindWord}${labelWords(recipe.label)}${after}`;
}

function trialsWords(recipe: Recipe, used: number | null): string {
  const number = used === null ? 'the trials' : formatPlural(used, 'trial');
  if ('all' in recipe.trials) return number;
  if ('ids' in recipe.trials) return `${number} of a list`;
  return `${number} (${recipe.trials.where.map(conditionWords).join(', ')})`;
}

function nuisanceWords(recipe: Recipe): string {
  if (recipe.nuisance.handling === 'none' || recipe.nuisance.columns.length === 0) return '';
  const columns = recipe.nuisance.columns.map(({ column, term }) => `${column} (${term})`).join(', ');
  return ` ${columns} were taken out of rates and label by coefficients of the training trials.`;
}

/** A recipe written out as the sentences of a methods section. */
export function recipeWords(recipe: Recipe, counts: RecipeCounts, kind?: LabelFact['kind']): string {
  const rule = unitsWords(recipe.units);
  const units = `${counts.unitsUsed === null ? 'the units' : formatPlural(counts.unitsUsed, 'unit')}${rule ? ` (${rule})` : ''}`;
  const { startMs, endMs } = recipe.window;
  const rates =
    recipe.features === 'windowMean'
      ? `${transforms[recipe.transform]}mean rates`
      : `${transforms[recipe.transform]}rates of each bin`;
  const penalty = penaltyWords(recipe.estimator);
  const what = recipe.estimator.kind === 'ridge' ? 'the penalty' : 'the number of components';
  const choice =
    penalty === ''
      ? ''
      : `; ${what} was ${penalty}${penalty.startsWith('fixed') ? '' : ' within the training trials of each fold'}`;
  const scheme = recipe.null;
  const shuffles =
    scheme.kind === 'none'
      ? ' No shuffled control was run.'
      : ` The same pipeline was repeated for ${formatPlural(scheme.draws ?? 0, 'shuffle')} of the label ${nullWords(scheme)}, folds fixed${penalty.startsWith('chosen') ? ', choice included' : ''}.`;
  return (
    `${theLabel(recipe, kind)} was read out from ${units} over ${trialsWords(recipe, counts.trialsUsed)} by ` +
    `${estimatorWords(recipe.estimator.kind)} on ${rates} ${formatNumber(startMs, 0)} to ${formatNumber(endMs, 0)} ms ` +
    `from the alignment event, z-scored with the mean and 1/n standard deviation of the training trials.` +
    nuisanceWords(recipe) +
    ` Performance was measured on held-out trials in ${foldsWords(recipe.folds)}${choice}.` +
    shuffles +
    ` Seed ${recipe.seed}.`
  );
}
