import { describe, expect, it } from 'vitest';
import { changesFrom } from '@/components/recipe/changes-from';
import { countRecipe } from '@/components/recipe/count-recipe';
import { formFromRecipe } from '@/components/recipe/form-from-recipe';
import { proposeForm } from '@/components/recipe/propose-form';
import { readIndexList } from '@/components/recipe/read-index-list';
import { readTypedNumber } from '@/components/recipe/read-typed-number';
import { recipeChecks } from '@/components/recipe/recipe-checks';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import { recipeFromForm } from '@/components/recipe/recipe-from-form';
import { rowOfProblem } from '@/components/recipe/row-of-problem';
import { recipeInputSchema, recipeSchema, type Recipe } from '@/lib/contracts/recipe';

const n = 40;
const facts: RecipeFacts = {
  sessionId: '00000000-0000-7000-8000-000000000000',
  nTrials: n,
  nBins: 12,
  binWidthMs: 50,
  windowStartMs: -100,
  labels: [{ column: 'fraction', kind: 'nominal' }],
  trialColumns: [
    { name: 'fraction', type: 'number', values: Array.from({ length: n }, (_, k) => (k % 4) / 4) },
    {
      name: 'block',
      type: 'category',
      values: Array.from({ length: n }, (_, k) => `b${Math.floor(k / 10)}`),
    },
    { name: 'speed', type: 'number', values: Array.from({ length: n }, (_, k) => (k % 3) + 2) },
  ],
  units: Array.from({ length: 8 }, (_, k) => ({ rateHz: k, presence: k / 8, area: k < 4 ? 'MT' : 'MST' })),
  areaColumn: 'area',
  excludedTrials: [0],
  excludedUnits: [7],
  exclusionsVersion: 2,
  blockColumn: 'block',
  rateHz: Array.from({ length: n }, (_, k) => Math.sin(k / 9)),
  populationRateHz: null,
};
const { form, why } = proposeForm(facts, 42);

describe('proposeForm', () => {
  it('proposes contiguous folds for a drifting rate and shuffles within block, and says why', () => {
    expect(form).toMatchObject({
      folds: 'contiguous',
      null: 'within',
      nullColumn: 'block',
      startMs: '0',
      endMs: '500',
    });
    expect(why.folds).toContain('drifts');
  });
  it('takes speed for a nuisance, neither label nor block, and proposes the controls that ask why', () => {
    expect(form.nuisance).toEqual({ speed: 'linear' });
    expect(form.controls.map((control) => control.kind)).toEqual([
      'window',
      'nuisanceOnly',
      'incremental',
      'totalRate',
      'trialOrder',
    ]);
    expect(form.controls[0]).toEqual({ kind: 'window', startMs: -100, endMs: 0 });
  });
  it('shuffles whole groups where the label is constant in a block', () => {
    const constant = {
      ...facts,
      trialColumns: [
        {
          ...facts.trialColumns[0],
          values: facts.trialColumns[1].values.map((b) => Number(String(b).slice(1))),
        },
        ...facts.trialColumns.slice(1),
      ],
    };
    expect(proposeForm(constant, 1).form.null).toBe('groups');
  });
});

describe('recipeFromForm', () => {
  it('gives a recipe that the API takes', () => {
    const { recipe, faults } = recipeFromForm(form, facts);
    expect(faults).toEqual([]);
    expect(recipeInputSchema.parse(recipe)).toEqual(recipe);
  });
  it('names each field that cannot be read', () => {
    const { recipe, faults } = recipeFromForm(
      { ...form, k: '1', draws: 'many', units: 'list', unitList: '1-9' },
      facts,
    );
    expect(recipe).toBeNull();
    expect(faults.map((fault) => fault.field).sort()).toEqual(['draws', 'k', 'unitList']);
  });
  it('comes back from a recipe unchanged, whatever the form can and cannot express', () => {
    const base = recipeSchema.parse({
      ...recipeFromForm(form, facts).recipe,
      labelTransform: { kind: 'none' },
    });
    const variants: Recipe[] = [
      base,
      { ...base, units: { rule: { where: [{ column: 'area', op: '=', value: 'MT' }] } } },
      { ...base, units: { rule: { minRateHz: 1, where: [{ column: 'depth', op: '>', value: 3 }] } } },
      { ...base, units: { rule: { minRateHz: 1 } } },
      { ...base, units: { ids: [0, 1, 5] } },
      { ...base, trials: { where: [{ column: 'speed', op: '>=', value: 3 }] } },
      { ...base, trials: { ids: [1, 2, 3] } },
      {
        ...base,
        estimator: {
          kind: 'ridge',
          penalty: { choose: 'innerFolds', innerFolds: 4, grid: { from: 1, to: 100, count: 7 } },
        },
      },
      { ...base, estimator: { kind: 'ridge', penalty: { value: 12.5 } } },
      { ...base, estimator: { kind: 'pls', components: { value: 3 } } },
      { ...base, folds: { kind: 'stratified', k: 4, repeats: 3 } },
      { ...base, folds: { kind: 'given', assignment: Array.from({ length: n }, (_, k) => k % 2) } },
      { ...base, folds: { kind: 'leaveOneGroupOut', groupColumn: 'block' } },
      { ...base, null: { kind: 'none' } },
      { ...base, nuisance: { columns: [{ column: 'speed', term: 'spline' }], handling: 'adjust' } },
      {
        ...base,
        controls: [
          { kind: 'incremental', columns: [{ column: 'speed', term: 'quadratic' }] },
          { kind: 'generalise', column: 'speed', train: [2, 3], test: [4] },
          { kind: 'injection', sizes: [0.05, 0.1], draws: 10 },
        ],
        views: [{ kind: 'timeCourse', widthMs: 100, stepMs: 50 }, { kind: 'weights' }],
      },
      { ...base, labelTransform: { kind: 'logit', epsilon: 0.02 } },
    ];
    for (const variant of variants) {
      const again = recipeFromForm(formFromRecipe(variant, facts, form), facts);
      expect(again.faults).toEqual([]);
      expect(changesFrom(variant, recipeSchema.parse(again.recipe))).toEqual([]);
    }
  });
});

describe('countRecipe', () => {
  it('leaves out excluded trials and units and follows rules and conditions', () => {
    const recipe = recipeFromForm(
      {
        ...form,
        units: 'rule',
        minRate: '2',
        minPresence: '0.5',
        trials: 'where',
        trialColumn: 'speed',
        trialOp: '>',
        trialValue: '3',
      },
      facts,
    ).recipe;
    expect(recipe).not.toBeNull();
    // speed 4 in trials 2, 5, … 38: 13 of them; units 4, 5, 6 (7 is left out)
    expect(countRecipe(recipe!, facts)).toEqual({ trialsUsed: 13, unitsUsed: 3 });
  });
});

describe('recipeChecks', () => {
  const rowsOf = (change: Partial<typeof form>, severity: string): string[] =>
    recipeChecks(recipeFromForm({ ...form, ...change }, facts).recipe!, facts)
      .filter((check) => check.severity === severity)
      .map((check) => check.row);
  it('stops a window edge between bins, folds beyond trials and a rule that keeps nothing', () => {
    expect(rowsOf({ startMs: '12' }, 'stops')).toContain('window');
    expect(rowsOf({ endMs: '900' }, 'stops')).toContain('window');
    expect(rowsOf({ k: '60', purge: '0' }, 'stops')).toContain('folds');
    expect(rowsOf({ units: 'rule', minRate: '99' }, 'stops')).toContain('units');
  });
  it('warns of least squares with too many features, and of no shuffles', () => {
    expect(rowsOf({ estimator: 'leastSquares', features: 'bins' }, 'warns')).toContain('estimator');
    expect(rowsOf({ null: 'none' }, 'warns')).toContain('null');
    expect(rowsOf({}, 'stops')).toEqual([]);
  });
  it('stops at a number of a control that cannot be read', () => {
    const { recipe, faults } = recipeFromForm(
      {
        ...form,
        controls: [{ kind: 'window', startMs: Number.NaN, endMs: 0 }],
        views: [{ kind: 'learning', sizes: [], draws: 3 }],
      },
      facts,
    );
    expect(recipe).toBeNull();
    expect(faults.map((fault) => fault.row)).toEqual(['controls', 'views']);
  });
  it('warns of a nuisance that goes with the label', () => {
    const tied = {
      ...facts,
      trialColumns: [
        ...facts.trialColumns.slice(0, 2),
        {
          ...facts.trialColumns[2],
          values: facts.trialColumns[0].values.map((value) => Number(value) * 3 + 1),
        },
      ],
    };
    const checks = recipeChecks(recipeFromForm(form, tied).recipe!, tied);
    expect(checks.find((check) => check.row === 'nuisance')?.message).toContain(
      'speed goes with the label (r 1.00)',
    );
  });
  it('warns of a label that goes with trial order', () => {
    const trend = {
      ...facts,
      trialColumns: [
        { ...facts.trialColumns[0], values: facts.rateHz.map((_, k) => k) },
        ...facts.trialColumns.slice(1),
      ],
    };
    const checks = recipeChecks(recipeFromForm(form, trend).recipe!, trend);
    expect(checks.some((check) => check.row === 'label' && check.severity === 'warns')).toBe(true);
  });
});

describe('small readers', () => {
  it('reads numbers as people type them', () => {
    expect(readTypedNumber('1\u00a0000')).toBe(1000);
    expect(readTypedNumber('0,5')).toBe(0.5);
    expect(readTypedNumber('−20')).toBe(-20);
    expect(readTypedNumber('12 ms')).toBeNull();
    expect(readTypedNumber('')).toBeNull();
  });
  it('reads lists counted from 1', () => {
    expect(readIndexList('1-3, 8; 2', 8)).toEqual([0, 1, 2, 7]);
    expect(readIndexList('0', 8)).toBeNull();
    expect(readIndexList('5-2', 8)).toBeNull();
    expect(readIndexList('9', 8)).toBeNull();
  });
  it('finds the row of a problem', () => {
    expect(rowOfProblem({ code: 'x', place: { path: '/recipe/null/draws' } })).toBe('null');
    expect(rowOfProblem({ code: 'x', place: { path: '/recipe/window' } })).toBe('window');
    expect(rowOfProblem({ code: 'fold-too-small', place: { fold: 2 } })).toBe('folds');
  });
});
