import type { Recipe } from '@/lib/contracts/recipe';
import type { VerdictControl } from '@/lib/reports/verdict/verdict-facts';

/** Parts of a recipe in the words that a sentence needs. */
export const recipeWords = {
  label: (recipe: Recipe): string => recipe.label.replaceAll('_', ' '),

  estimator({ estimator }: Recipe): string {
    const names = {
      leastSquares: 'least squares',
      ridge: 'ridge',
      pcr: 'principal-component regression',
      pls: 'partial least squares',
    };
    return names[estimator.kind];
  },

  /** Follows "shuffles"; empty for a free one. */
  shuffle(recipe: Recipe): string {
    const { kind, column } = recipe.null;
    switch (kind) {
      case 'within':
        return `within ${column}`;
      case 'groups':
        return `by whole groups of ${column}`;
      case 'circularShift':
        return 'by circular shifts';
      case 'sessions':
        return 'to the labels of other sessions';
      case 'given':
        return 'as given';
      default:
        return '';
    }
  },

  folds({ folds }: Recipe): string {
    switch (folds.kind) {
      case 'stratified':
        return `${folds.k} stratified folds${(folds.repeats ?? 1) > 1 ? `, ${folds.repeats} times` : ''}`;
      case 'contiguous':
        return `${folds.k} contiguous folds${folds.purgeTrials ? `, purge gap ${folds.purgeTrials}` : ''}`;
      case 'leaveOneGroupOut':
        return `folds by ${folds.groupColumn}`;
      case 'given':
        return 'given folds';
    }
  },

  /** What a control is about, as nouns. */
  control(recipe: Recipe, at: number): VerdictControl['subjects'] {
    const control = recipe.controls[at];
    switch (control?.kind) {
      case 'nuisanceOnly':
      case 'incremental':
      case 'adjusted':
        return control.columns.map(({ column }) => column.replaceAll('_', ' '));
      case 'matched':
      case 'generalise':
        return [control.column.replaceAll('_', ' ')];
      case 'totalRate':
      case 'rateNormalised':
        return ['firing rate'];
      case 'trialOrder':
        return ['trial order'];
      case 'window':
        return [`the window ${control.startMs} to ${control.endMs} ms`];
      case 'breakCorrelations':
        return ['correlations between units'];
      case 'injection':
        return ['an injected signal'];
      default:
        return ['a control'];
    }
  },
};
