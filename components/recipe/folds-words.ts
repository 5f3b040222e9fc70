import type { FoldsRecipe } from '@/lib/contracts/recipe';
import { formatPlural } from '@/lib/format/format-plural';

/** Folds in the middle of a sentence: "5 contiguous folds with a purge gap of 6 trials". */
export function foldsWords(folds: FoldsRecipe): string {
  const repeats =
    folds.repeats && folds.repeats > 1 ? `, repeated ${folds.repeats} times with new folds` : '';
  switch (folds.kind) {
    case 'stratified':
      return `${folds.k ?? 5} random folds stratified by label${repeats}`;
    case 'contiguous':
      return `${folds.k ?? 5} contiguous folds ${folds.purgeTrials ? `with a purge gap of ${formatPlural(folds.purgeTrials, 'trial')}` : 'without a purge gap'}`;
    case 'leaveOneGroupOut':
      return `folds that each leave one ${folds.groupColumn ?? 'group'} out`;
    case 'given':
      return `folds given trial by trial${repeats}`;
  }
}
