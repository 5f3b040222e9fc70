import type { Recipe, RecipeInput } from '@/lib/contracts/recipe';

export interface RecipeDefaults {
  windowStartMs: number;
  binWidthMs: number;
  nBins: number;
  /** Entries in the session's exclusion list now. */
  exclusionsVersion: number;
  seed: number;
}

/**
 * Fills every field that was left out. The filled recipe is what is hashed, stored, returned and carried out, so that
 * a later change of a default never changes an old readout.
 */
export function fillRecipe(input: RecipeInput, defaults: RecipeDefaults): Recipe {
  return {
    label: input.label,
    labelTransform: fillTransform(input.labelTransform),
    trials: input.trials ?? { all: true },
    units: input.units ?? { all: true },
    exclusions: input.exclusions ?? { version: defaults.exclusionsVersion },
    window: input.window ?? defaultWindow(defaults),
    features: input.features ?? 'windowMean',
    transform: input.transform ?? 'none',
    estimator: fillEstimator(input.estimator),
    folds: fillFolds(input.folds),
    nuisance: input.nuisance ?? { columns: [], handling: 'none' },
    null: fillNull(input.null),
    controls: input.controls ?? [],
    views: input.views ?? [],
    seed: input.seed ?? defaults.seed,
  };
}

function fillTransform(given: RecipeInput['labelTransform']): Recipe['labelTransform'] {
  return given?.kind === 'logit' ? { epsilon: 0.001, ...given } : (given ?? { kind: 'none' });
}

/** From the alignment event (the first bin edge at or after it) to the end; all bins where that leaves none. */
function defaultWindow({ windowStartMs, binWidthMs, nBins }: RecipeDefaults): Recipe['window'] {
  const edge = (bin: number) => windowStartMs + bin * binWidthMs;
  const firstBin = Math.max(0, Math.ceil(-windowStartMs / binWidthMs - 1e-9));
  return { startMs: edge(firstBin < nBins ? firstBin : 0), endMs: edge(nBins) };
}

function fillEstimator(given: RecipeInput['estimator']): Recipe['estimator'] {
  const estimator = given ?? { kind: 'ridge', penalty: { choose: 'leaveOneOut' } };
  if (
    estimator.kind === 'ridge' &&
    'choose' in estimator.penalty &&
    estimator.penalty.choose === 'innerFolds'
  )
    return { ...estimator, penalty: { innerFolds: 5, ...estimator.penalty } };
  if (
    (estimator.kind === 'pcr' || estimator.kind === 'pls') &&
    'choose' in estimator.components &&
    estimator.components.choose === 'innerFolds'
  )
    return { ...estimator, components: { innerFolds: 5, ...estimator.components } };
  return estimator;
}

function fillFolds(given: RecipeInput['folds']): Recipe['folds'] {
  const folds = given ?? { kind: 'stratified' };
  switch (folds.kind) {
    case 'stratified':
      return { ...folds, k: folds.k ?? 5, repeats: folds.repeats ?? 1 };
    case 'contiguous':
      return { ...folds, k: folds.k ?? 5, purgeTrials: folds.purgeTrials ?? 0 };
    default:
      return folds;
  }
}

function fillNull(given: RecipeInput['null']): Recipe['null'] {
  const scheme = given ?? { kind: 'free' };
  switch (scheme.kind) {
    case 'none':
    case 'sessions': // one draw for each other session, however many there are
      return scheme;
    case 'given':
      return Array.isArray(scheme.permutations) ? { ...scheme, draws: scheme.permutations.length } : scheme;
    default:
      return { ...scheme, draws: scheme.draws ?? 1_000 };
  }
}
