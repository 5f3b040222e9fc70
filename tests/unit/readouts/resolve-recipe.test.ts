import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/contracts/recipe';
import { fillRecipe } from '@/lib/services/readouts/fill-recipe';
import { resolveRecipe } from '@/lib/services/readouts/resolve-recipe';
import type { SessionTables } from '@/lib/services/readouts/session-tables';
import { makeTables } from '@/tests/unit/readouts/make-tables';

const fill = (input: Partial<RecipeInput> = {}, tables = makeTables()) =>
  fillRecipe({ label: 'fraction', ...input }, { ...tables, exclusionsVersion: 0, seed: 7 });

function resolve(
  input: Partial<RecipeInput> = {},
  given: Partial<Parameters<typeof resolveRecipe>[2]> = {},
  tables: SessionTables = makeTables(),
) {
  const { permutations } = fill(input).null;
  return resolveRecipe(fill(input, tables), tables, {
    excludedTrials: [],
    excludedUnits: [],
    ...(Array.isArray(permutations) ? { permutations } : {}),
    ...given,
  });
}
function resolved(...args: Parameters<typeof resolve>) {
  const outcome = resolve(...args);
  if ('faults' in outcome) throw new Error(JSON.stringify(outcome.faults));
  return outcome.resolved;
}
function faults(...args: Parameters<typeof resolve>) {
  const outcome = resolve(...args);
  return 'faults' in outcome ? outcome.faults.map(({ pointer, code }) => `${pointer} ${code}`) : [];
}

describe('the filled recipe', () => {
  it('has every default, and a window from the alignment event to the end', () => {
    expect(fill()).toEqual({
      label: 'fraction',
      labelTransform: { kind: 'none' },
      trials: { all: true },
      units: { all: true },
      exclusions: { version: 0 },
      window: { startMs: 0, endMs: 200 },
      features: 'windowMean',
      transform: 'none',
      estimator: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
      folds: { kind: 'stratified', k: 5, repeats: 1 },
      nuisance: { columns: [], handling: 'none' },
      null: { kind: 'free', draws: 1000 },
      controls: [],
      views: [],
      seed: 7,
    });
  });
  it('starts with the recording where that begins after the event, and off-grid at the next bin edge', () => {
    expect(fill({}, makeTables({ windowStartMs: 30 })).window).toEqual({ startMs: 30, endMs: 330 });
    expect(fill({}, makeTables({ windowStartMs: -120 })).window).toEqual({ startMs: 30, endMs: 180 });
    expect(fill({}, makeTables({ windowStartMs: -400 })).window).toEqual({ startMs: -400, endMs: -100 });
  });
});

describe('trials', () => {
  it('are all included by default', () => {
    const { input, counts } = resolved();
    expect([...input.trialIndex]).toEqual([...Array(12).keys()]);
    expect(counts).toMatchObject({ trialsAll: 12, trialsUsed: 12, trialsExcluded: 0, trialsMissing: 0 });
  });
  it('are chosen by conditions, all of which must hold', () => {
    const where = [
      { column: 'speed', op: '>=' as const, value: 3 },
      { column: 'block', op: '=' as const, value: 'a' },
    ];
    expect([
      ...resolved({ trials: { where }, folds: { kind: 'stratified', k: 2 } }).input.trialIndex,
    ]).toEqual([1, 2, 4, 5]);
  });
  it('are dropped and counted when the label or a used column is missing', () => {
    const tables = makeTables();
    tables.trials[0].values[3] = NaN as never;
    tables.trials[1].values[5] = NaN as never;
    const plain = resolved({}, {}, tables);
    expect(plain.counts).toMatchObject({ trialsUsed: 11, trialsMissing: 1 });
    const withNuisance = resolved(
      { nuisance: { columns: [{ column: 'speed', term: 'linear' }], handling: 'adjust' } },
      {},
      tables,
    );
    expect(withNuisance.counts).toMatchObject({ trialsUsed: 10, trialsMissing: 2 });
    expect(withNuisance.notes[0].message).toContain('2 trials');
  });
  it('are counted as excluded, not missing, when both', () => {
    const tables = makeTables();
    tables.trials[0].values[3] = NaN as never;
    expect(resolved({}, { excludedTrials: [3, 4] }, tables).counts).toMatchObject({
      trialsUsed: 10,
      trialsExcluded: 2,
      trialsMissing: 0,
    });
  });
});

describe('units', () => {
  it('follow a rule on rate, presence and unit columns', () => {
    const tables = makeTables({
      unitFacts: { meanRateHz: Float64Array.of(1, 5, 5, 5), presence: Float64Array.of(1, 1, 0.2, 1) },
    });
    const rule = { minRateHz: 2, minPresence: 0.5 };
    expect([...resolved({ units: { rule } }, {}, tables).input.unitIndex]).toEqual([1, 3]);
    const where = [{ column: 'area', op: 'in' as const, value: ['V1'] }];
    expect([...resolved({ units: { rule: { ...rule, where } } }, {}, tables).input.unitIndex]).toEqual([3]);
  });
  it('leave the excluded ones out', () => {
    expect([...resolved({}, { excludedUnits: [2] }).input.unitIndex]).toEqual([0, 1, 3]);
  });
});

describe('faults', () => {
  it('name an unknown label and what there is', () => {
    const outcome = resolve({ label: 'nothing' });
    expect('faults' in outcome && outcome.faults[0].message).toContain('fraction, speed');
  });
  it.each<[string, Partial<RecipeInput>, string[]]>([
    ['a class label', { label: 'block' }, ['/recipe/label label-type']],
    ['a circular label', { label: 'heading' }, ['/recipe/label label-type']],
    ['a constant label', { trials: { ids: [0, 4, 8] } }, ['/recipe/label constant-label']],
    ['an edge off the grid', { window: { startMs: 10, endMs: 200 } }, ['/recipe/window/startMs window-edge']],
    ['an edge outside', { window: { startMs: 0, endMs: 250 } }, ['/recipe/window/endMs window-edge']],
    ['an empty window', { window: { startMs: 50, endMs: 50 } }, ['/recipe/window/endMs window-edge']],
    ['more folds than trials', { folds: { kind: 'stratified', k: 13 } }, ['/recipe/folds/k too-few-trials']],
    ['a trial too many', { trials: { ids: [0, 1, 12] } }, ['/recipe/trials/ids/2 no-such-trial']],
    ['a unit too many', { units: { ids: [4] } }, ['/recipe/units/ids/0 no-such-unit']],
    [
      'an option of another kind of folds',
      { folds: { kind: 'stratified', purgeTrials: 2 } },
      ['/recipe/folds/purgeTrials not-for-this-kind'],
    ],
    ['a null without its column', { null: { kind: 'within' } }, ['/recipe/null/column required']],
    [
      'a linear term of names',
      { nuisance: { columns: [{ column: 'block', term: 'linear' }], handling: 'none' } },
      ['/recipe/nuisance/columns/0/term nuisance-term'],
    ],
    [
      'a condition of the wrong type',
      { trials: { where: [{ column: 'speed', op: '=', value: 'fast' }] } },
      ['/recipe/trials/where/0/value condition-type'],
    ],
    [
      'a level on both sides',
      { controls: [{ kind: 'generalise', column: 'speed', train: [2], test: [2, 9] }] },
      ['/recipe/controls/0/test/0 level-on-both-sides', '/recipe/controls/0/test/1 no-such-level'],
    ],
  ])('%s', (_, input, expected) => expect(faults(input)).toEqual(expected));
  it('come all at once', () => {
    expect(
      faults({
        window: { startMs: 1, endMs: 200 },
        units: { ids: [9] },
        folds: { kind: 'stratified', k: 50 },
      }),
    ).toEqual([
      '/recipe/window/startMs window-edge',
      '/recipe/units/ids/0 no-such-unit',
      '/recipe/folds/k too-few-trials',
    ]);
  });
});

describe('given folds', () => {
  const row = Array.from({ length: 12 }, (_, t) => t % 3);
  it('run over the session’s trials; null leaves a trial out', () => {
    const assignment = row.map((fold, t) => (t === 2 ? null : fold));
    const { input, counts } = resolved({ folds: { kind: 'given', assignment } }, { excludedTrials: [1] });
    expect(counts).toMatchObject({ trialsUsed: 10, trialsExcluded: 2 });
    expect(input.folds).toEqual({
      kind: 'given',
      assignment: [Int32Array.of(0, -1, -1, 0, 1, 2, 0, 1, 2, 0, 1, 2)],
    });
  });
  it.each<[string, unknown, string]>([
    ['are as long as the session', row.slice(1), '/recipe/folds/assignment length'],
    ['are as long as the session in each repeat', [row, row.slice(1)], '/recipe/folds/assignment/1 length'],
    ['have no gaps', row.map((fold) => fold * 2), '/recipe/folds/assignment empty-fold'],
    ['are two at least', row.map(() => 0), '/recipe/folds/assignment too-few-folds'],
    ['are complete in every repeat', [row, [null, ...row.slice(1)]], '/recipe/folds/assignment/1/0 no-fold'],
  ])('%s', (_, assignment, expected) =>
    expect(faults({ folds: { kind: 'given', assignment: assignment as number[] } })).toEqual([expected]),
  );
  it('take inner folds of the training trials', () => {
    const inner = [0, 1, 2].map((fold) => row.map((own, t) => (own === fold ? null : t % 2)));
    const { folds } = resolved({ folds: { kind: 'given', assignment: row, inner } }).input;
    expect(folds.kind === 'given' && [...folds.inner![0][1].subarray(0, 4)]).toEqual([0, -1, 0, 1]);
    inner[1][1] = 0;
    expect(faults({ folds: { kind: 'given', assignment: row, inner } })).toEqual([
      '/recipe/folds/inner/1/1 held-out-trial',
    ]);
  });
});

describe('given permutations', () => {
  const identity = [...Array(12).keys()];
  it('index the trials that take part', () => {
    const permutations = [[1, 0, ...Array(8).keys()].map((i, at) => (at < 2 ? i : i + 2))];
    const { nullScheme } = resolved(
      { null: { kind: 'given', permutations } },
      { excludedTrials: [0, 1] },
    ).input;
    expect(nullScheme).toEqual({ kind: 'given', permutations: [Int32Array.from(permutations[0])] });
  });
  it('are refused by row and place', () => {
    expect(faults({ null: { kind: 'given', permutations: [identity, identity.slice(1)] } })).toEqual([
      '/recipe/null/permutations/1 length',
    ]);
    expect(faults({ null: { kind: 'given', permutations: [[...identity.slice(0, 11), 12]] } })).toEqual([
      '/recipe/null/permutations/0/11 range',
    ]);
    expect(
      faults({ null: { kind: 'given', permutations: [identity, [0, 0, ...identity.slice(2)]] } }),
    ).toEqual(['/recipe/null/permutations/1/1 repeated']);
  });
});

describe('bins', () => {
  it('are those of the window and of the control windows alone', () => {
    expect(resolved().bins).toEqual({ binFrom: 2, binTo: 6 });
    expect(resolved({ controls: [{ kind: 'window', startMs: -100, endMs: 0 }] }).bins).toEqual({
      binFrom: 0,
      binTo: 6,
    });
    expect(resolved({ window: { startMs: 50, endMs: 100 } }).bins).toEqual({ binFrom: 3, binTo: 4 });
  });
});

describe('label transforms', () => {
  it('are fixed functions, and a logarithm that does not exist is a fault with its trial', () => {
    expect(faults({ labelTransform: { kind: 'log' } })).toEqual(['/recipe/labelTransform label-transform']);
    const { input } = resolved({ labelTransform: { kind: 'logit', epsilon: 0.25 } });
    expect(input.y[0]).toBeCloseTo(Math.log(1 / 3), 12);
    expect(input.y[2]).toBe(0);
  });
});
