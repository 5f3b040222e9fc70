import { describe, expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { EstimatorSpec, ReadoutInput, ReadoutNumbers } from '@/lib/engine/readout/types';
import { check, checkTable } from '@/tests/reference/stats/checks';

// Published data of small whole numbers, taken as spike counts in one bin of 1 s: the numbers come out of a whole readout.
// Sources: tests/fixtures/checks/checks.json.

/** A session whose unit j counted rows[i][j] spikes on trial i; folds as given. */
function sessionOf(
  rows: number[][],
  y: number[],
  folds: number[],
  estimator: EstimatorSpec,
  changes: Partial<ReadoutInput> = {},
): ReadoutInput {
  const n = rows.length;
  return {
    counts: Int32Array.from(rows.flat()),
    nTrials: n,
    nUnits: rows[0].length,
    nBins: 1,
    binWidthMs: 1000,
    windowStartMs: 0,
    y: Float64Array.from(y),
    labelName: 'label',
    trialIndex: Int32Array.from({ length: n }, (_, i) => i),
    unitIndex: Int32Array.from({ length: rows[0].length }, (_, j) => j),
    window: { startMs: 0, endMs: 1000 },
    features: 'windowMean',
    transform: 'none',
    estimator,
    folds: { kind: 'given', assignment: [Int32Array.from(folds)] },
    nuisance: { variables: [], handling: 'none' },
    nullScheme: { kind: 'none' },
    controls: [],
    views: [],
    seed: 1,
    ...changes,
  };
}

function run(input: ReadoutInput): ReadoutNumbers {
  const result = runReadout(input, portableLinalg);
  if (!result.ok) throw new Error(result.problems.map((problem) => problem.message).join(' '));
  return result.numbers;
}

const leastSquares: EstimatorSpec = { kind: 'leastSquares' };
const leaveOneOut = (n: number): number[] => Array.from({ length: n }, (_, i) => i);

describe('attitude, five blocks of six trials (scikit-learn’s StandardScaler and Ridge in a pipeline)', () => {
  const table = checkTable('attitude.csv');
  const [x, y] = [table.map((row) => row.slice(1)), table.map((row) => row[0])];
  const blocks = y.map((_, i) => Math.floor(i / 6));
  const { expected } = check<
    object,
    Record<string, { RMSE: number; R2_train_mean: number; r?: number }> & { pred10_first5: number[] }
  >('ridge-attitude-cv');
  it.each(['0', '1', '10', '100'])('penalty %s: RMSE, R² against the training mean, and r', (alpha) => {
    const estimator: EstimatorSpec =
      alpha === '0' ? leastSquares : { kind: 'ridge', penalty: { value: Number(alpha) } };
    const { heldOut } = run(sessionOf(x, y, blocks, estimator));
    const wanted = expected[`alpha=${alpha}`];
    expect(heldOut.rmse).toBeCloseTo(wanted.RMSE, 8);
    expect(heldOut.r2).toBeCloseTo(wanted.R2_train_mean, 8);
    if (wanted.r !== undefined) expect(heldOut.r).toBeCloseTo(wanted.r, 8);
  });
  it('penalty 10: the first five held-out predictions', () => {
    const { predictions } = run(sessionOf(x, y, blocks, { kind: 'ridge', penalty: { value: 10 } }));
    const byTrial = new Map(Array.from(predictions.trial, (trial, i) => [trial, predictions.predicted[i]]));
    expected.pred10_first5.forEach((value, trial) => expect(byTrial.get(trial)).toBeCloseTo(value, 8));
  });
});

describe('leave-one-out least squares', () => {
  it('stack loss: PRESS and R² against the training mean (Brownlee 1965; R 4.2.2)', () => {
    const table = checkTable('stackloss.csv');
    const { expected } = check<object, { PRESS: number; RMSEP: number; Q2_train_mean: number }>(
      'ols-stackloss',
    );
    const { heldOut } = run(
      sessionOf(
        table.map((row) => row.slice(0, 3)),
        table.map((row) => row[3]),
        leaveOneOut(21),
        leastSquares,
      ),
    );
    expect(heldOut.rmse).toBeCloseTo(expected.RMSEP, 9);
    expect(21 * (heldOut.rmse ?? NaN) ** 2).toBeCloseTo(expected.PRESS, 7);
    expect(heldOut.r2).toBeCloseTo(expected.Q2_train_mean, 9);
  });
  it('Longley: PRESS and R² against the training mean (NIST StRD; Allen 1974)', () => {
    const table = checkTable('longley_nist.csv');
    const { expected } = check<object, { PRESS: number; Q2_train_mean: number }>('ols-longley-loo');
    // The first predictor has one decimal; ten times it is a whole number, and least squares does not mind.
    const x = table.map(([, first, ...rest]) => [Math.round(10 * first), ...rest]);
    const { heldOut } = run(
      sessionOf(
        x,
        table.map((row) => row[0]),
        leaveOneOut(16),
        leastSquares,
      ),
    );
    expect((16 * (heldOut.rmse ?? NaN) ** 2) / expected.PRESS).toBeCloseTo(1, 8);
    expect(heldOut.r2).toBeCloseTo(expected.Q2_train_mean, 9);
  });
});

describe('attitude, what the units add to a nuisance (Anderson-Sprecher 1994, within folds; numpy)', () => {
  const table = checkTable('attitude.csv');
  const [x, y] = [table.map((row) => row.slice(1)), table.map((row) => row[0])];
  const blocks = y.map((_, i) => Math.floor(i / 6));
  const { expected } = check<object, { partial_R2: number; R2tm_nuisance: number; R2tm_full: number }>(
    'partial-r2',
  );
  const columns = [
    { name: 'learning', term: 'linear' as const, values: Float64Array.from(table, (row) => row[3]) },
  ];
  it('incremental R² of all six predictors over learning, and R² of learning alone', () => {
    // The nuisance is among the units too: least squares of both together is that of the units.
    const controls: ReadoutInput['controls'] = [
      { kind: 'incremental', columns },
      { kind: 'nuisanceOnly', columns },
    ];
    const numbers = run(sessionOf(x, y, blocks, leastSquares, { controls }));
    expect(numbers.heldOut.r2).toBeCloseTo(expected.R2tm_full, 9);
    expect(numbers.controls[0].heldOut?.r2).toBeCloseTo(expected.partial_R2, 9);
    expect(numbers.controls[1].heldOut?.r2).toBeCloseTo(expected.R2tm_nuisance, 9);
  });
});

/** Weights and patterns of fold 0's readout, from the engine's chunk for them. */
function weightsOfFirstFold(input: ReadoutInput): { weights: Float64Array; pattern: Float64Array } {
  const planned = planReadout({ ...input, views: [{ kind: 'weights' }] });
  if (!planned.ok) throw new Error('the plan was refused');
  const chunk = planned.plan.chunks.find(({ job }) => job.kind === 'weights' && job.split === 0);
  if (!chunk) throw new Error('there is no chunk for the weights');
  const cache = { get: () => undefined, set: () => undefined };
  const { values } = runChunk(input, planned.plan, chunk, portableLinalg, cache);
  return { weights: values.weights as Float64Array, pattern: values.pattern as Float64Array };
}

describe('weights and patterns (Haufe et al., NeuroImage 2014)', () => {
  it('the two-channel example: x₁ = s + d, x₂ = d gives w = (1, −1) and pattern (1, 0)', () => {
    const { inputs, expected } = check<{ w: number[] }, { A: number[] }>('haufe');
    // s and d each 0 or 2 in all four combinations: uncorrelated, unit variance. Fold 1 trains fold 0's readout.
    const s = [0, 0, 2, 2, 0, 0, 2, 2];
    const d = [0, 2, 0, 2, 0, 2, 0, 2];
    const rows = s.map((value, i) => [value + d[i], d[i]]);
    const found = weightsOfFirstFold(sessionOf(rows, s, [0, 0, 0, 0, 1, 1, 1, 1], leastSquares));
    inputs.w.forEach((w, j) => expect(found.weights[j]).toBeCloseTo(w, 12));
    expected.A.forEach((a, j) => expect(found.pattern[j]).toBeCloseTo(a, 12));
  });
  it('ridge on attitude: weights and patterns in units of each predictor’s standard deviation', () => {
    const { expected } = check<object, { w_std: number[]; 'pattern_cov(Z,s)/var(s)': number[] }>('edf');
    const table = checkTable('attitude.csv');
    // All 30 rows train the readout of a fold that holds out four copies of other rows.
    const rows = [...table, ...table.slice(0, 4)];
    const folds = rows.map((_, i) => (i < 30 ? 1 : 0));
    const found = weightsOfFirstFold(
      sessionOf(
        rows.map((row) => row.slice(1)),
        rows.map((row) => row[0]),
        folds,
        { kind: 'ridge', penalty: { value: 10 } },
      ),
    );
    for (let j = 0; j < 6; j += 1) {
      const column = table.map((row) => row[j + 1]);
      const centre = column.reduce((a, b) => a + b) / 30;
      const sd = Math.sqrt(column.reduce((sum, v) => sum + (v - centre) ** 2, 0) / 30);
      expect(found.weights[j] * sd).toBeCloseTo(expected.w_std[j], 9);
      expect(found.pattern[j] / sd).toBeCloseTo(expected['pattern_cov(Z,s)/var(s)'][j], 9);
    }
  });
});

describe("Anscombe's quartet, leave one out (Am. Stat. 1973; R 4.2.2)", () => {
  // Typed from memory; the expected values confirm them.
  const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
  const sets = [
    [x, [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68]],
    [x, [9.14, 8.14, 8.74, 8.77, 9.26, 8.1, 6.13, 3.1, 9.13, 7.26, 4.74]],
    [x, [7.46, 6.77, 12.74, 7.11, 7.81, 8.84, 6.08, 5.39, 8.15, 6.42, 5.73]],
    [
      [8, 8, 8, 8, 8, 8, 8, 19, 8, 8, 8],
      [6.58, 5.76, 7.71, 8.84, 8.47, 7.04, 5.25, 12.5, 5.56, 7.91, 6.89],
    ],
  ];
  const { expected } = check<object, { LOO_RMSE: (number | null)[] }>('anscombe');
  it.each([0, 1, 2])('set %i', (s) => {
    const { heldOut } = run(
      sessionOf(
        sets[s][0].map((v) => [v]),
        sets[s][1],
        leaveOneOut(11),
        leastSquares,
      ),
    );
    expect(heldOut.rmse).toBeCloseTo(expected.LOO_RMSE[s] ?? NaN, 9);
  });
  it('set 4: without its one other value the unit is constant; it is dropped and counted, nothing is NaN', () => {
    const numbers = run(
      sessionOf(
        sets[3][0].map((v) => [v]),
        sets[3][1],
        leaveOneOut(11),
        leastSquares,
      ),
    );
    expect(numbers.perFold.filter((fold) => fold.droppedFeatures === 1).map((fold) => fold.fold)).toEqual([
      7,
    ]);
    const alone = Array.from(numbers.predictions.trial).indexOf(7);
    const others = sets[3][1].filter((_, i) => i !== 7);
    expect(numbers.predictions.predicted[alone]).toBeCloseTo(others.reduce((a, b) => a + b) / 10, 10);
    expect(JSON.stringify(numbers)).not.toMatch(/NaN|Infinity/);
    expect(Number.isFinite(numbers.heldOut.rmse)).toBe(true);
  });
});
