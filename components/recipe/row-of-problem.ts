import type { RecipeRowKey } from '@/components/recipe/recipe-form-state';
import type { Problem } from '@/lib/contracts/problem';

const rows: Record<string, RecipeRowKey> = {
  label: 'label',
  labelTransform: 'label',
  trials: 'trials',
  exclusions: 'trials',
  units: 'units',
  window: 'window',
  features: 'window',
  transform: 'window',
  estimator: 'estimator',
  folds: 'folds',
  nuisance: 'nuisance',
  null: 'null',
  controls: 'controls',
  views: 'views',
  seed: 'seed',
};

/** The row of the form that a problem of the server is about: by its pointer, else by what its code speaks of. */
export function rowOfProblem(problem: Pick<Problem, 'code' | 'place'>): RecipeRowKey {
  const [, field] = /^\/?(?:recipe\/)?(\w+)/.exec(problem.place.path ?? '') ?? [];
  if (field && field in rows) return rows[field];
  if (problem.place.fold !== undefined || /fold|group/i.test(problem.code)) return 'folds';
  if (/unit|feature|variance/i.test(problem.code)) return 'units';
  if (/window|bin/i.test(problem.code)) return 'window';
  if (/null|shuffle|draw|exchange|trend/i.test(problem.code)) return 'null';
  if (/penalt|grid|component/i.test(problem.code)) return 'estimator';
  return 'label';
}
