import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import type {
  EstimatorSpec,
  FoldsSpec,
  NuisanceVariable,
  ReadoutInput,
  ReadoutPlan,
} from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeInput } from '@/tests/unit/engine/make-input';

const linalg = openNativeLinalg() ?? portableLinalg;
const N = 40;

const choices = ['leaveOneOut', 'gcv', 'innerFolds'] as const;
const estimators: [string, EstimatorSpec][] = [
  ['least squares', { kind: 'leastSquares' }],
  ['ridge 5', { kind: 'ridge', penalty: { value: 5 } }],
  ...choices.map((choose): [string, EstimatorSpec] => [
    `ridge ${choose}`,
    { kind: 'ridge', penalty: { choose } },
  ]),
  ['pcr 3', { kind: 'pcr', components: { value: 3 } }],
  ...choices.map((choose): [string, EstimatorSpec] => [
    `pcr ${choose}`,
    { kind: 'pcr', components: { choose, max: 5 } },
  ]),
  ['pls 2', { kind: 'pls', components: { value: 2 } }],
  ['pls innerFolds', { kind: 'pls', components: { choose: 'innerFolds', max: 4 } }],
  ['pls leaveOneOut', { kind: 'pls', components: { choose: 'leaveOneOut', max: 3 } }],
];
const folds: [string, FoldsSpec][] = [
  ['stratified', { kind: 'stratified', k: 4, repeats: 2 }],
  ['contiguous', { kind: 'contiguous', k: 4, purgeTrials: 2 }],
  ['leaveOneGroupOut', { kind: 'leaveOneGroupOut', group: Int32Array.from({ length: N }, (_, i) => i % 5) }],
  ['given', { kind: 'given', assignment: [Int32Array.from({ length: N }, (_, i) => (i * 7) % 4)] }],
];
const speed: NuisanceVariable = {
  name: 'speed',
  term: 'spline',
  values: Float64Array.from({ length: N }, (_, i) => Math.sin(i * 1.3) + i / N),
};
const nuisances: [string, ReadoutInput['nuisance']][] = [
  ['without nuisance', { variables: [], handling: 'none' }],
  ['adjusted', { variables: [speed], handling: 'adjust' }],
];
const cells = estimators.flatMap(([a, estimator]) =>
  folds.flatMap(([b, fold]) =>
    nuisances.map(([c, nuisance]) => [`${a}, ${b}, ${c}`, estimator, fold, nuisance] as const),
  ),
);

const predictionsOf = (input: ReadoutInput, plan: ReadoutPlan, split: number): number[] => {
  const none = { get: () => undefined, set: () => undefined };
  const chunk = plan.chunks.find(
    ({ job }) => job.kind === 'observed' && job.task === 0 && job.split === split,
  );
  if (chunk === undefined) throw new Error('no such chunk');
  return Array.from(runChunk(input, plan, chunk, linalg, none).values.predicted as Float64Array);
};

describe('no held-out value changes when its own label is altered', () => {
  it.each(cells)('%s', (_, estimator, fold, nuisance) => {
    fc.assert(
      fc.property(
        fc.nat(1000),
        fc.nat(N - 1),
        fc.double({ min: -100, max: 100, noNaN: true }),
        (seed, trial, shift) => {
          const base = makeInput(
            { nTrials: N, nUnits: 6, nBins: 2, seed },
            { estimator, folds: fold, nuisance, nullScheme: { kind: 'none' } },
          );
          const planned = planReadout(base);
          if (!planned.ok) throw new Error(JSON.stringify(planned.problems));
          // The plan (who is in which fold) stays: only what is computed from it may not see the altered label.
          const { plan } = planned;
          const split = plan.foldSets[0].splits.findIndex(({ test }) => test.includes(trial));
          const y = base.y.slice();
          y[trial] += shift;
          expect(predictionsOf({ ...base, y }, plan, split)).toEqual(predictionsOf(base, plan, split));
        },
      ),
      { numRuns: 3 },
    );
  });

  it('would notice a leak: a training label does change the predictions', () => {
    const base = makeInput({ nTrials: N, nUnits: 6, nBins: 2 }, { nullScheme: { kind: 'none' } });
    const planned = planReadout(base);
    if (!planned.ok) throw new Error('no plan');
    const y = base.y.slice();
    y[planned.plan.foldSets[0].splits[0].train[0]] += 3;
    expect(predictionsOf({ ...base, y }, planned.plan, 0)).not.toEqual(predictionsOf(base, planned.plan, 0));
  });
});
