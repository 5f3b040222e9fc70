import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { PenaltyChoice, RecipeFormState } from '@/components/recipe/recipe-form-state';
import type { NuisanceColumn, Recipe } from '@/lib/contracts/recipe';

type TrialPart = Partial<Pick<RecipeFormState, 'trials' | 'trialColumn' | 'trialOp' | 'trialValue'>>;
type UnitPart = Partial<Pick<RecipeFormState, 'units' | 'minRate' | 'minPresence' | 'area' | 'unitList'>>;
type EstimatorPart = Partial<
  Pick<
    RecipeFormState,
    'choose' | 'value' | 'innerFolds' | 'grid' | 'gridFrom' | 'gridTo' | 'gridCount' | 'maxComponents'
  >
>;

function trialPart(trials: Recipe['trials']): TrialPart {
  if ('all' in trials) return { trials: 'all' };
  if ('where' in trials && trials.where.length === 1) {
    const [{ column, op, value }] = trials.where;
    if (op !== 'in' && !Array.isArray(value))
      return { trials: 'where', trialColumn: column, trialOp: op, trialValue: String(value) };
  }
  return { trials: 'kept' };
}

function unitPart(units: Recipe['units'], facts: RecipeFacts): UnitPart {
  if ('all' in units) return { units: 'all' };
  if ('ids' in units) return { units: 'list', unitList: units.ids.map((id) => id + 1).join(', ') };
  const { minRateHz, minPresence, where } = units.rule;
  if (!where || where.length === 0)
    return {
      units: 'rule',
      minRate: String(minRateHz ?? ''),
      minPresence: String(minPresence ?? ''),
    };
  const [condition] = where;
  const isArea =
    where.length === 1 &&
    condition.column === facts.areaColumn &&
    condition.op === '=' &&
    minRateHz === undefined &&
    minPresence === undefined;
  return isArea ? { units: 'area', area: String(condition.value) } : { units: 'kept' };
}

function estimatorPart(estimator: Recipe['estimator']): EstimatorPart {
  if (estimator.kind === 'leastSquares') return {};
  const choice = estimator.kind === 'ridge' ? estimator.penalty : estimator.components;
  if ('value' in choice) return { choose: 'value', value: String(choice.value) };
  const choose: PenaltyChoice = choice.choose;
  const grid = 'grid' in choice ? choice.grid : undefined;
  const max = 'max' in choice ? choice.max : undefined;
  return {
    choose,
    innerFolds: String(choice.innerFolds ?? 5),
    ...(grid
      ? {
          grid: 'own' as const,
          gridFrom: String(grid.from),
          gridTo: String(grid.to),
          gridCount: String(grid.count),
        }
      : {}),
    maxComponents: max === undefined ? '' : String(max),
  };
}

/** The recipe's own nuisance columns, else those of its first control that names some. */
function nuisanceColumns(recipe: Recipe): readonly NuisanceColumn[] {
  if (recipe.nuisance.columns.length > 0) return recipe.nuisance.columns;
  for (const control of recipe.controls) if ('columns' in control) return control.columns;
  return [];
}

/** The form that says what a recipe says; parts that it has no field for are kept as they are. */
export function formFromRecipe(recipe: Recipe, facts: RecipeFacts, plain: RecipeFormState): RecipeFormState {
  const { folds, null: scheme } = recipe;
  return {
    ...plain,
    from: recipe,
    label: recipe.label,
    labelTransform: recipe.labelTransform.kind,
    ...trialPart(recipe.trials),
    ...unitPart(recipe.units, facts),
    startMs: String(recipe.window.startMs),
    endMs: String(recipe.window.endMs),
    features: recipe.features,
    transform: recipe.transform,
    estimator: recipe.estimator.kind,
    ...estimatorPart(recipe.estimator),
    folds: folds.kind === 'given' ? 'kept' : folds.kind,
    k: String(folds.k ?? plain.k),
    purge: String(folds.purgeTrials ?? plain.purge),
    repeats: String(folds.repeats ?? 1),
    groupColumn: folds.groupColumn ?? plain.groupColumn,
    nuisance: Object.fromEntries(nuisanceColumns(recipe).map(({ column, term }) => [column, term])),
    handling: recipe.nuisance.columns.length > 0 ? recipe.nuisance.handling : 'none',
    controls: recipe.controls,
    views: recipe.views,
    null: scheme.kind === 'given' || scheme.kind === 'sessions' ? 'kept' : scheme.kind,
    nullColumn: scheme.column ?? plain.nullColumn,
    draws: String(scheme.draws ?? plain.draws),
    seed: String(recipe.seed),
  };
}
