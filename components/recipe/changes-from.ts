import type { Recipe, RecipeInput } from '@/lib/contracts/recipe';

const names: Partial<Record<keyof RecipeInput, string>> = {
  label: 'label',
  labelTransform: 'label transform',
  trials: 'trials',
  units: 'units',
  exclusions: 'exclusions',
  window: 'window',
  features: 'features',
  transform: 'transform',
  estimator: 'estimator',
  folds: 'folds',
  nuisance: 'nuisances',
  null: 'shuffled control',
  controls: 'controls',
  views: 'views',
  seed: 'seed',
};

function stable(value: unknown): string {
  return JSON.stringify(value, (_key, part: unknown) =>
    part !== null && typeof part === 'object' && !Array.isArray(part)
      ? Object.fromEntries(Object.entries(part).sort(([a], [b]) => a.localeCompare(b)))
      : part,
  );
}

/** The parts in which a filled recipe differs from another, by the words of the form. */
export function changesFrom(from: Recipe, to: Recipe): string[] {
  return (Object.keys(names) as (keyof Recipe)[])
    .filter((key) => stable(from[key]) !== stable(to[key]))
    .map((key) => names[key] ?? key);
}
