import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import type { FoldSetup } from '@/lib/engine/crossval/fold-setup';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { EstimatorSpec } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';

const linalg = openNativeLinalg() ?? portableLinalg;
const RUNS = { numRuns: 40 };

interface Made {
  x: Float64Array;
  y: Float64Array;
  p: number;
  nTrain: number;
  nTest: number;
}

/** Random features and labels; the last nTest rows are held out. */
const made = fc
  .record({
    seed: fc.nat(1_000_000),
    nTrain: fc.integer({ min: 6, max: 24 }),
    nTest: fc.integer({ min: 1, max: 5 }),
    p: fc.integer({ min: 1, max: 30 }),
  })
  .map(({ seed, nTrain, nTest, p }): Made => {
    const generator = splitGenerator(seed, 'property');
    const n = nTrain + nTest;
    const y = Float64Array.from({ length: n }, () => randomNormal(generator));
    const x = new Float64Array(n * p);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < p; j++) x[i * p + j] = randomNormal(generator) + 0.4 * y[i] * (j % 3);
    return { x, y, p, nTrain, nTest };
  });

const range = (from: number, to: number): Int32Array =>
  Int32Array.from({ length: to - from }, (_, i) => from + i);

function setupOf(data: Made, estimator: EstimatorSpec, changes: Partial<FoldSetup> = {}): FoldSetup {
  const n = data.nTrain + data.nTest;
  return {
    x: data.x,
    p: data.p,
    train: range(0, data.nTrain),
    test: range(data.nTrain, n),
    estimator,
    scaling: 'unit',
    trials: range(0, n),
    inner: () => ({ foldOf: range(0, data.nTrain).map((i) => i % 3), k: 3, purgeTrials: 0 }),
    ...changes,
  };
}

function predict(setup: FoldSetup, y: Float64Array): Float64Array {
  const fit = fitFold(setup, linalg);
  return evaluateLabels(
    fit,
    Float64Array.from(setup.train, (i) => y[i]),
    1,
    linalg,
  ).predicted;
}

function expectClose(a: Float64Array, b: Float64Array, tolerance = 1e-8): void {
  expect(a.length).toBe(b.length);
  a.forEach((value, i) =>
    expect(Math.abs(value - b[i])).toBeLessThan(tolerance * Math.max(1, Math.abs(value))),
  );
}

const ridge = (value: number): EstimatorSpec => ({ kind: 'ridge', penalty: { value } });
const estimators: [string, EstimatorSpec][] = [
  ['least squares', { kind: 'leastSquares' }],
  ['ridge, fixed', ridge(3)],
  ['ridge, leave-one-out', { kind: 'ridge', penalty: { choose: 'leaveOneOut' } }],
  ['ridge, gcv', { kind: 'ridge', penalty: { choose: 'gcv' } }],
  ['ridge, inner folds', { kind: 'ridge', penalty: { choose: 'innerFolds' } }],
  ['pcr', { kind: 'pcr', components: { value: 2 } }],
  ['pcr, inner folds', { kind: 'pcr', components: { choose: 'innerFolds', max: 4 } }],
  ['pls', { kind: 'pls', components: { value: 2 } }],
  ['pls, inner folds', { kind: 'pls', components: { choose: 'innerFolds', max: 4 } }],
];

describe('identities of ridge', () => {
  it('is the same on stacked rows with twice the penalty', () => {
    fc.assert(
      fc.property(made, fc.double({ min: 0.01, max: 50, noNaN: true }), (data, penalty) => {
        const once = setupOf(data, ridge(penalty));
        const train = new Int32Array(2 * data.nTrain);
        once.train.forEach((i, at) => train.fill(i, 2 * at, 2 * at + 2));
        expectClose(
          predict(once, data.y),
          predict({ ...once, train, estimator: ridge(2 * penalty) }, data.y),
        );
      }),
      RUNS,
    );
  });

  it('is the same in its primal, dual and SVD form as the normal equations', () => {
    fc.assert(
      fc.property(made, fc.double({ min: 0.1, max: 50, noNaN: true }), (data, penalty) => {
        const setup = setupOf(data, ridge(penalty), { scaling: 'none' });
        const { p, nTrain, nTest, x, y } = data;
        // (ZᵀZ + λI)w = Zᵀy by elimination, independent of any factorisation of the engine.
        const mean = new Float64Array(p);
        for (let i = 0; i < nTrain; i++) for (let j = 0; j < p; j++) mean[j] += x[i * p + j] / nTrain;
        const yMean = y.subarray(0, nTrain).reduce((a, b) => a + b, 0) / nTrain;
        const a = Array.from({ length: p }, (_, j) =>
          Array.from({ length: p + 1 }, (__, l) => {
            let sum = j === l ? penalty : 0;
            for (let i = 0; i < nTrain; i++) {
              sum += (x[i * p + j] - mean[j]) * (l === p ? y[i] - yMean : x[i * p + l] - mean[l]);
            }
            return sum;
          }),
        );
        for (let j = 0; j < p; j++) {
          for (let l = 0; l < p; l++) {
            if (l === j) continue;
            const factor = a[l][j] / a[j][j];
            for (let c = j; c <= p; c++) a[l][c] -= factor * a[j][c];
          }
        }
        const wanted = Float64Array.from({ length: nTest }, (_, i) => {
          let sum = yMean;
          for (let j = 0; j < p; j++) sum += ((x[(nTrain + i) * p + j] - mean[j]) * a[j][p]) / a[j][j];
          return sum;
        });
        expectClose(predict(setup, y), wanted);
      }),
      RUNS,
    );
  });

  it('goes to least squares of minimum norm as the penalty goes to 0', () => {
    fc.assert(
      fc.property(made, (data) => {
        fc.pre(Math.abs(data.nTrain - 1 - data.p) > 2); // near-square designs are ill conditioned by chance
        const limit = predict(setupOf(data, { kind: 'leastSquares' }), data.y);
        expectClose(predict(setupOf(data, ridge(1e-10)), data.y), limit, 1e-5);
        expectClose(predict(setupOf(data, ridge(0)), data.y), limit, 1e-10);
      }),
      RUNS,
    );
  });

  it('goes to the training mean as the penalty grows', () => {
    fc.assert(
      fc.property(made, (data) => {
        const mean = data.y.subarray(0, data.nTrain).reduce((a, b) => a + b, 0) / data.nTrain;
        expectClose(predict(setupOf(data, ridge(1e14)), data.y), new Float64Array(data.nTest).fill(mean));
      }),
      RUNS,
    );
  });

  it('scores leave-one-out as explicit refits with fixed scaling do', () => {
    fc.assert(
      fc.property(made, fc.double({ min: 0.5, max: 50, noNaN: true }), (data, penalty) => {
        const fit = fitFold(
          setupOf(data, {
            kind: 'ridge',
            penalty: { choose: 'leaveOneOut', grid: { from: penalty, to: 2 * penalty, count: 2 } },
          }),
          linalg,
        );
        if (fit.chooser.kind !== 'closedForm') throw new Error('closed form is wanted');
        const { p, nTrain, x, y } = data;
        const all = setupOf(data, ridge(penalty), { scaling: 'none' });
        // Scale once with the training fold's numbers, then leave each trial out and refit with an intercept.
        const z = x.slice();
        for (let i = 0; i < z.length; i++) z[i] = (x[i] - fit.mean[i % p]) / fit.sd[i % p];
        let explicit = 0;
        for (let i = 0; i < nTrain; i++) {
          const train = all.train.filter((row) => row !== i);
          const [value] = predict({ ...all, x: z, train, test: Int32Array.of(i) }, y);
          explicit += (y[i] - value) ** 2;
        }
        const h = fit.candidates[1];
        const single = fitFold(setupOf(data, ridge(penalty)), linalg);
        expect(h.penalty).toBeCloseTo(penalty, 8);
        const c = new Float64Array(single.factor.r);
        const mean = y.subarray(0, nTrain).reduce((a, b) => a + b, 0) / nTrain;
        const { left, r } = fit.factor;
        for (let i = 0; i < nTrain; i++) for (let j = 0; j < r; j++) c[j] += (y[i] - mean) * left[i * r + j];
        let closed = 0;
        for (let i = 0; i < nTrain; i++) {
          let fitted = mean;
          for (let j = 0; j < r; j++) fitted += left[i * r + j] * h.fit[j] * c[j];
          closed += ((y[i] - fitted) * (fit.chooser.weights[1]?.[i] ?? NaN)) ** 2;
        }
        expect(Math.abs(closed - explicit) / explicit).toBeLessThan(1e-9);
      }),
      RUNS,
    );
  });
});

describe.each(estimators)('invariances of %s', (_, estimator) => {
  it('does not mind the order of the units', () => {
    fc.assert(
      fc.property(made, fc.nat(1000), (data, seed) => {
        const order = range(0, data.p);
        shuffle(order, splitGenerator(seed, 'order'));
        const x = data.x.map((__, at) => data.x[at - (at % data.p) + order[at % data.p]]);
        expectClose(
          predict(setupOf(data, estimator), data.y),
          predict(setupOf({ ...data, x }, estimator), data.y),
          1e-7,
        );
      }),
      RUNS,
    );
  });

  it('does not mind the order of the training trials', () => {
    fc.assert(
      fc.property(made, fc.nat(1000), (data, seed) => {
        const setup = setupOf(data, estimator);
        const train = setup.train.slice();
        shuffle(train, splitGenerator(seed, 'order'));
        const inner = () => ({ foldOf: train.map((i) => i % 3), k: 3, purgeTrials: 0 });
        expectClose(predict(setup, data.y), predict({ ...setup, train, inner }, data.y), 1e-7);
      }),
      RUNS,
    );
  });

  it('follows affine changes of the label', () => {
    fc.assert(
      fc.property(
        made,
        fc.double({ min: 0.1, max: 10, noNaN: true }),
        fc.double({ min: -5, max: 5, noNaN: true }),
        (data, a, b) => {
          const changed = predict(
            setupOf(data, estimator),
            data.y.map((v) => a * v + b),
          );
          expectClose(
            predict(setupOf(data, estimator), data.y).map((v) => a * v + b),
            changed,
            1e-7,
          );
        },
      ),
      RUNS,
    );
  });

  it('does not mind a unit being measured on another scale', () => {
    fc.assert(
      fc.property(made, fc.double({ min: 0.01, max: 100, noNaN: true }), (data, scale) => {
        const x = data.x.map((v, at) => (at % data.p === 0 ? v * scale + 3 : v));
        expectClose(
          predict(setupOf(data, estimator), data.y),
          predict(setupOf({ ...data, x }, estimator), data.y),
          1e-7,
        );
      }),
      RUNS,
    );
  });
});

describe('native and portable backends', () => {
  const native = openNativeLinalg();
  it.skipIf(native === null).each(estimators)('agree to 1e-9 for %s', (_, estimator) => {
    fc.assert(
      fc.property(made, (data) => {
        const setup = setupOf(data, estimator);
        const yTrain = data.y.subarray(0, data.nTrain);
        const both = [native ?? portableLinalg, portableLinalg].map((la) =>
          evaluateLabels(fitFold(setup, la), yTrain, 1, la),
        );
        expectClose(both[0].predicted, both[1].predicted, 1e-9);
      }),
      { numRuns: 20 },
    );
  });
});
