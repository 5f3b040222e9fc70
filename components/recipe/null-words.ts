import type { NullRecipe } from '@/lib/contracts/recipe';

/** How labels are shuffled, as it follows "1 000 shuffles": "within block". */
export function nullWords(scheme: NullRecipe): string {
  switch (scheme.kind) {
    case 'none':
      return '';
    case 'free':
      return 'over all trials';
    case 'within':
      return `within ${scheme.column ?? 'a column'}`;
    case 'groups':
      return `of whole groups of ${scheme.column ?? 'a column'}`;
    case 'circularShift':
      return 'by circular shifts';
    case 'sessions':
      return 'with other sessions’ label sequences';
    case 'given':
      return 'as given';
  }
}
