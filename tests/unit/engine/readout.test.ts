import { describe, expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { finishReadout } from '@/lib/engine/readout/finish-readout';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { EstimatorSpec, ReadoutInput, ReadoutNumbers } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeInput } from '@/tests/unit/engine/make-input';

const linalg = openNativeLinalg() ?? portableLinalg;
const cold = { get: () => undefined, set: () => undefined };

function run(input: ReadoutInput): ReadoutNumbers {
  const result = runReadout(input, linalg);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.numbers;
}

function expectFinite(value: unknown, path = ''): void {
  if (typeof value === 'number') expect(Number.isFinite(value), path).toBe(true);
  else if (ArrayBuffer.isView(value))
    (value as Float64Array).forEach((x, i) => expect(Number.isFinite(x), `${path}/${i}`).toBe(true));
  else if (value !== null && typeof value === 'object')
    for (const [key, part] of Object.entries(value)) expectFinite(part, `${path}/${key}`);
}

describe('a readout', () => {
  it('finds a strong signal and nothing without one', () => {
    const strong = run(makeInput({ nTrials: 120, signal: 1 }, { nullScheme: { kind: 'free', draws: 99 } }));
    expect(strong.heldOut.r2).toBeGreaterThan(0.5);
    expect(strong.null?.exceedances).toBe(0);
    expect(strong.null?.p).toBe(0.01);
    const none = run(makeInput({ nTrials: 120, signal: 0 }));
    expect(none.heldOut.r2).toBeLessThan(0.1);
  });

  it('holds every trial out once a repeat, with its label', () => {
    const input = makeInput(
      { nTrials: 60 },
      {
        folds: { kind: 'stratified', k: 5, repeats: 3 },
        trialIndex: Int32Array.from({ length: 50 }, (_, i) => i + 10),
      },
    );
    const { predictions, trialsUsed } = run(input);
    expect(predictions.trial).toHaveLength(150);
    expect(Array.from(predictions.trial.slice(50, 100))).toEqual(Array.from(trialsUsed));
    predictions.trial.forEach((trial, i) => expect(predictions.label[i]).toBe(input.y[trial]));
    expect(new Set(predictions.fold)).toEqual(new Set([0, 1, 2, 3, 4]));
  });

  it('gives the same bits in any order of chunks, with a cold cache, and after cloning', () => {
    const input = makeInput({}, { nullScheme: { kind: 'free', draws: 300 } });
    const whole = run(input);
    const planned = planReadout(structuredClone(input));
    if (!planned.ok) throw new Error('no plan');
    const plan = structuredClone(planned.plan);
    const outputs = [...plan.chunks]
      .reverse()
      .map((chunk) => structuredClone(runChunk(input, plan, chunk, linalg, cold)));
    expect(finishReadout(input, plan, outputs)).toEqual(whole);
  });

  it('changes with the seed and not without it', () => {
    const input = makeInput();
    expect(run(input)).toEqual(run(makeInput()));
    expect(run({ ...input, seed: 12 }).heldOut.r2).not.toBe(run(input).heldOut.r2);
  });

  it('counts the identity permutation as an exceedance', () => {
    const identity = Int32Array.from({ length: 60 }, (_, i) => i);
    const permutations = Array.from({ length: 40 }, () => identity);
    expect(run(makeInput({}, { nullScheme: { kind: 'given', permutations } })).null?.exceedances).toBe(40);
  });

  it('gives the numbers that its own predictions have', () => {
    const { heldOut, predictions } = run(makeInput());
    let error = 0;
    predictions.label.forEach((label, i) => (error += (label - predictions.predicted[i]) ** 2));
    expect(heldOut.rmse).toBeCloseTo(Math.sqrt(error / 60), 12);
  });
});

describe('degenerate data end in a stated outcome, never in NaN', () => {
  const estimators: [string, EstimatorSpec][] = [
    ['least squares', { kind: 'leastSquares' }],
    ['ridge', { kind: 'ridge', penalty: { choose: 'leaveOneOut' } }],
    ['ridge gcv', { kind: 'ridge', penalty: { choose: 'gcv' } }],
    ['ridge inner', { kind: 'ridge', penalty: { choose: 'innerFolds' } }],
    ['pcr', { kind: 'pcr', components: { choose: 'innerFolds' } }],
    ['pls', { kind: 'pls', components: { choose: 'innerFolds' } }],
  ];
  describe.each(estimators)('%s', (_, estimator) => {
    const base = makeInput(
      { nTrials: 30, nUnits: 4, nBins: 2 },
      { estimator, nullScheme: { kind: 'free', draws: 8 } },
    );
    it('silent units only: predicts the training mean', () => {
      const numbers = run({ ...base, counts: new Int32Array(base.counts.length) });
      expectFinite(numbers);
      expect(numbers.heldOut.r2).toBeCloseTo(0, 12);
      expect(numbers.perFold[0].droppedFeatures).toBe(4);
      expect(numbers.warnings.some(({ code }) => code === 'features-dropped')).toBe(true);
    });
    it('duplicate units', () => {
      const counts = base.counts.slice();
      for (let t = 0; t < 30; t++)
        for (let u = 1; u < 4; u++)
          for (let b = 0; b < 2; b++) counts[(t * 4 + u) * 2 + b] = counts[t * 4 * 2 + b];
      expectFinite(run({ ...base, counts }));
    });
    it('a perfect fit', () => {
      const counts = new Int32Array(30 * 4 * 2);
      base.y.forEach((value, t) => (counts[t * 8] = Math.round(value * 5)));
      const numbers = run({ ...base, counts });
      expectFinite(numbers);
      expect(numbers.heldOut.r2).toBeGreaterThan(0.99);
    });
    it('more features than trials, every bin a feature', () => {
      expectFinite(
        run(
          makeInput(
            { nTrials: 18, nUnits: 12, nBins: 4 },
            {
              estimator,
              features: 'bins',
              transform: 'sqrt',
              folds: { kind: 'contiguous', k: 3, purgeTrials: 1 },
              nullScheme: { kind: 'free', draws: 5 },
            },
          ),
        ),
      );
    });
    it('two folds: no nested-cross-validation interval', () => {
      const numbers = run({ ...base, folds: { kind: 'stratified', k: 2, repeats: 1 } });
      expectFinite(numbers);
      expect(numbers.heldOut.r2Interval).toBeNull();
    });
  });
});
