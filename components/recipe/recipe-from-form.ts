import { readIndexList } from '@/components/recipe/read-index-list';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { RecipeFormState, RecipeRowKey } from '@/components/recipe/recipe-form-state';
import type { EstimatorRecipe, RecipeInput } from '@/lib/contracts/recipe';

/** A field that cannot be read: which, and what to write instead. */
export interface FormFault {
  row: RecipeRowKey;
  field: keyof RecipeFormState;
  message: string;
}

/** Whether every number in a structure is finite and every list has something in it. */
function isReadable(part: unknown): boolean {
  if (typeof part === 'number') return Number.isFinite(part);
  if (Array.isArray(part)) return part.every(isReadable);
  if (part !== null && typeof part === 'object')
    return Object.values(part).every(
      (value) => isReadable(value) && !(Array.isArray(value) && value.length === 0),
    );
  return true;
}

/** Turns the form into a recipe, or says of each field that cannot be read what is wrong. */
export function recipeFromForm(
  form: RecipeFormState,
  facts: RecipeFacts,
): { recipe: RecipeInput | null; faults: FormFault[] } {
  const faults: FormFault[] = [];
  const number = (
    row: RecipeRowKey,
    field: keyof RecipeFormState,
    what: string,
    bounds: { low?: number; high?: number; whole?: boolean } = {},
  ): number => {
    const value = readTypedNumber(String(form[field] ?? ''));
    const { low = -Infinity, high = Infinity, whole = false } = bounds;
    if (value === null) faults.push({ row, field, message: `Write ${what} as a number.` });
    else if (whole && !Number.isInteger(value))
      faults.push({ row, field, message: `${what} must be a whole number.` });
    else if (value < low || value > high)
      faults.push({
        row,
        field,
        message:
          high === Infinity
            ? `${what} must be at least ${low}.`
            : low === -Infinity
              ? `${what} must be at most ${high}.`
              : `${what} must lie between ${low} and ${high}.`,
      });
    return value ?? Number.NaN;
  };

  const trials = (): RecipeInput['trials'] => {
    if (form.trials === 'kept' && form.from) return form.from.trials;
    if (form.trials === 'all') return { all: true };
    const column = facts.trialColumns.find((candidate) => candidate.name === form.trialColumn);
    if (column?.type === 'category') {
      if (form.trialValue.trim() === '')
        faults.push({
          row: 'trials',
          field: 'trialValue',
          message: 'Write the value that the column must have.',
        });
      return { where: [{ column: form.trialColumn, op: form.trialOp, value: form.trialValue.trim() }] };
    }
    return {
      where: [
        { column: form.trialColumn, op: form.trialOp, value: number('trials', 'trialValue', 'The value') },
      ],
    };
  };
  const units = (): RecipeInput['units'] => {
    if (form.units === 'kept' && form.from) return form.from.units;
    if (form.units === 'rule') {
      // An empty field is no condition; a rule needs at least one.
      const hasRate = form.minRate.trim() !== '';
      const hasPresence = form.minPresence.trim() !== '';
      if (!hasRate && !hasPresence)
        faults.push({
          row: 'units',
          field: 'minRate',
          message: 'Write a least rate, a least presence, or both.',
        });
      return {
        rule: {
          ...(hasRate ? { minRateHz: number('units', 'minRate', 'The least rate', { low: 0 }) } : {}),
          ...(hasPresence
            ? { minPresence: number('units', 'minPresence', 'The least presence', { low: 0, high: 1 }) }
            : {}),
        },
      };
    }
    if (form.units === 'area' && facts.areaColumn)
      return { rule: { where: [{ column: facts.areaColumn, op: '=', value: form.area }] } };
    if (form.units === 'list') {
      const ids = readIndexList(form.unitList, facts.units.length);
      if (ids) return { ids };
      faults.push({
        row: 'units',
        field: 'unitList',
        message: `Write unit numbers from 1 to ${facts.units.length}, such as 1-20, 34.`,
      });
    }
    return { all: true };
  };
  const estimator = (): EstimatorRecipe => {
    const { estimator: kind } = form;
    if (kind === 'leastSquares') return { kind };
    const inner = (): { innerFolds?: number } =>
      form.choose === 'innerFolds'
        ? {
            innerFolds: number('estimator', 'innerFolds', 'The number of inner folds', {
              low: 2,
              high: 50,
              whole: true,
            }),
          }
        : {};
    if (kind === 'ridge') {
      if (form.choose === 'value')
        return { kind, penalty: { value: number('estimator', 'value', 'The penalty', { low: 0 }) } };
      if (form.grid === 'default') return { kind, penalty: { choose: form.choose, ...inner() } };
      const from = number('estimator', 'gridFrom', 'The smallest penalty', { low: Number.MIN_VALUE });
      const to = number('estimator', 'gridTo', 'The largest penalty', { low: Number.MIN_VALUE });
      if (to <= from)
        faults.push({
          row: 'estimator',
          field: 'gridTo',
          message: 'The largest penalty must be above the smallest.',
        });
      const count = number('estimator', 'gridCount', 'The number of penalties', {
        low: 2,
        high: 200,
        whole: true,
      });
      return { kind, penalty: { choose: form.choose, ...inner(), grid: { from, to, count } } };
    }
    if (form.choose === 'value')
      return {
        kind,
        components: {
          value: number('estimator', 'value', 'The number of components', { low: 1, whole: true }),
        },
      };
    const max =
      form.maxComponents.trim() === ''
        ? {}
        : {
            max: number('estimator', 'maxComponents', 'The largest number of components', {
              low: 1,
              whole: true,
            }),
          };
    return { kind, components: { choose: form.choose, ...inner(), ...max } };
  };
  const folds = (): RecipeInput['folds'] => {
    if (form.folds === 'kept' && form.from) return form.from.folds;
    if (form.folds === 'leaveOneGroupOut') return { kind: 'leaveOneGroupOut', groupColumn: form.groupColumn };
    const k = number('folds', 'k', 'The number of folds', { low: 2, high: 1000, whole: true });
    if (form.folds === 'contiguous')
      return {
        kind: 'contiguous',
        k,
        purgeTrials: number('folds', 'purge', 'The purge gap', { low: 0, whole: true }),
      };
    return {
      kind: 'stratified',
      k,
      repeats: number('folds', 'repeats', 'The number of repeats', { low: 1, high: 100, whole: true }),
    };
  };
  const shuffles = (): RecipeInput['null'] => {
    if (form.null === 'kept' && form.from) return form.from.null;
    if (form.null === 'none' || form.null === 'kept') return { kind: 'none' };
    const draws = number('null', 'draws', 'The number of draws', { low: 1, high: 100_000, whole: true });
    if (form.null === 'within' || form.null === 'groups')
      return { kind: form.null, column: form.nullColumn, draws };
    return { kind: form.null, draws };
  };

  const recipe: RecipeInput = {
    label: form.label,
    labelTransform:
      form.from?.label === form.label && form.from.labelTransform.kind === form.labelTransform
        ? form.from.labelTransform
        : { kind: form.labelTransform },
    trials: trials(),
    units: units(),
    exclusions: { version: facts.exclusionsVersion },
    window: {
      startMs: number('window', 'startMs', 'The start of the window'),
      endMs: number('window', 'endMs', 'The end of the window'),
    },
    features: form.features,
    transform: form.transform,
    estimator: estimator(),
    folds: folds(),
    nuisance:
      form.handling === 'adjust'
        ? {
            columns: Object.entries(form.nuisance).map(([column, term]) => ({ column, term })),
            handling: 'adjust',
          }
        : { columns: [], handling: 'none' },
    null: shuffles(),
    controls: [...form.controls],
    views: [...form.views],
    seed: number('seed', 'seed', 'The seed', { low: 0, high: 4_294_967_295, whole: true }),
  };
  for (const row of ['controls', 'views'] as const)
    if (!isReadable(form[row]))
      faults.push({ row, field: row, message: 'A number of this row cannot be read.' });
  return { recipe: faults.length > 0 ? null : recipe, faults };
}
