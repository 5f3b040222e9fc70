import { penaltyWords } from '@/components/recipe/penalty-words';
import { unitsWords } from '@/components/recipe/units-words';
import type { ReadoutResult } from '@/lib/contracts/readout';
import type { Recipe } from '@/lib/contracts/recipe';
import { formatCount } from '@/lib/format/format-count';
import { formatPlural } from '@/lib/format/format-plural';

/** One fitted step of a readout, the rows it saw, and what is to be said about it. */
export interface LeakRow {
  step: string;
  rows: string;
  note: string;
}

function span(values: readonly number[]): string {
  const low = Math.min(...values);
  const high = Math.max(...values);
  return low === high ? formatCount(low) : `${formatCount(low)} to ${formatCount(high)}`;
}

/** Every step that was fitted or chosen and the rows it saw, from the recipe and the folds as they were carried out. */
export function leakRows(recipe: Recipe, result: ReadoutResult): LeakRow[] {
  const training = `${span(result.perFold.map((fold) => fold.nTrain))} training trials of the fold`;
  const same = 'the same training trials';
  const purged = result.perFold.reduce((sum, fold) => sum + fold.nPurged, 0);
  const dropped = result.perFold.reduce((sum, fold) => sum + fold.droppedFeatures, 0);
  const rows: LeakRow[] = [
    {
      step: 'mean and spread of each feature',
      rows: training,
      note: `never the held-out trials${purged > 0 ? ', nor the purged ones' : ''}`,
    },
  ];
  if (dropped > 0)
    rows.push({
      step: 'features without variance, dropped',
      rows: same,
      note: `${formatPlural(dropped, 'feature')} over all folds`,
    });
  if (recipe.nuisance.handling === 'adjust' && recipe.nuisance.columns.length > 0)
    rows.push({
      step: 'nuisance coefficients of rates and label',
      rows: same,
      note: recipe.nuisance.columns.map(({ column, term }) => `${column} (${term})`).join(', '),
    });
  const { estimator } = recipe;
  if (estimator.kind !== 'leastSquares') {
    const words = penaltyWords(estimator);
    const edge = result.perFold.filter((fold) => fold.atGridEdge).length;
    const what = estimator.kind === 'ridge' ? 'ridge penalty λ' : 'number of components';
    rows.push({
      step: what,
      rows: words.startsWith('fixed')
        ? 'none: fixed in the recipe'
        : `${same}, ${words.replace('chosen by ', '')}`,
      note: words.startsWith('fixed')
        ? ''
        : edge > 0
          ? `at the edge of its grid in ${formatPlural(edge, 'fold')}`
          : 'no choice at the edge of its grid',
    });
  }
  if (estimator.kind === 'pcr' || estimator.kind === 'pls')
    rows.push({ step: 'components', rows: same, note: '' });
  rows.push({ step: 'weights and intercept', rows: same, note: '' });
  rows.push({ step: 'label mean, the baseline of R²', rows: same, note: '' });
  rows.push({
    step: `units: ${'all' in recipe.units ? 'all' : unitsWords(recipe.units)}`,
    rows: 'rule' in recipe.units ? 'all trials, label not looked at' : 'none: fixed in the recipe',
    note: 'rule' in recipe.units ? 'allowed: blind to the label' : '',
  });
  rows.push({
    step: 'trials left out',
    rows: recipe.exclusions === 'none' ? 'none left out' : 'a member’s decision, dated, with its reason',
    note:
      recipe.exclusions === 'none'
        ? ''
        : `exclusion list at entry ${recipe.exclusions.version}: ${formatPlural(result.counts.trialsExcluded, 'trial')}`,
  });
  if (recipe.labelTransform.kind !== 'none')
    rows.push({
      step: `label transform (${recipe.labelTransform.kind})`,
      rows: 'none: a fixed function',
      note: '',
    });
  if (result.null)
    rows.push({
      step: 'shuffled control',
      rows: 'every step above again for each draw',
      note: 'same folds, shuffled labels',
    });
  return rows;
}
