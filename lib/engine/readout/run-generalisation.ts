import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { readoutWeights } from '@/lib/engine/crossval/readout-weights';
import type { Linalg } from '@/lib/engine/linalg/port';
import { gatherLabels } from '@/lib/engine/readout/gather-labels';
import { mainFeatures } from '@/lib/engine/readout/main-task';
import { viewWindows } from '@/lib/engine/readout/plan-views';
import { taskFeatures, taskLabels, taskSetup } from '@/lib/engine/readout/task-data';
import type { ChunkCache, ChunkOutput, ReadoutInput, ReadoutPlan, Task } from '@/lib/engine/readout/types';

/**
 * Temporal generalisation of one split: readouts trained in windows from…to, each tested in every window on the same
 * held-out trials. Scaling, weights and intercept are those of the training window. Nuisance is not taken out here.
 *
 * Gives `error`, (to − from) × windows: Σ(y − ŷ)² over held-out trials, and `baseline`: Σ(y − ȳ_train)².
 * Source: King & Dehaene, Trends Cogn. Sci. 2014.
 */
export function runGeneralisation(
  input: ReadoutInput,
  plan: ReadoutPlan,
  job: { view: number; split: number; from: number; to: number },
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const view = input.views[job.view];
  if (view.kind !== 'temporalGeneralisation') throw new RangeError('not a temporal generalisation');
  const windows = viewWindows(input, view);
  const set = plan.foldSets[0];
  const split = set.splits[job.split];
  const nTrained = job.to - job.from;
  const taskOf = (window: number): Task => ({
    ...plan.tasks[0],
    design: { kind: 'plain', nuisanceOf: -1 },
    features: { ...mainFeatures(input), window: windows[window] },
  });
  const y = taskLabels(input, plan, plan.tasks[0]);
  const yTrain = gatherLabels(y, 1, y.length, split.train);
  let p = 0;
  let weights = new Float64Array(0);
  const intercepts = new Float64Array(nTrained);
  let mean = 0;
  for (let i = 0; i < nTrained; i++) {
    const setup = taskSetup(
      input,
      plan,
      taskOf(job.from + i),
      split,
      cache,
      [split.repeat, split.fold],
      true,
    );
    const fit = fitFold({ ...setup, keepsScaled: true }, linalg);
    const evaluated = evaluateLabels(fit, yTrain, 1, linalg);
    if (i === 0) weights = new Float64Array(fit.p * nTrained);
    p = fit.p;
    mean = evaluated.trainMean[0];
    intercepts[i] = mean;
    const scaled = readoutWeights(fit, evaluated, 0, linalg);
    fit.kept.forEach((feature, j) => {
      const weight = scaled[j] / fit.sd[j];
      weights[feature * nTrained + i] = weight;
      intercepts[i] -= weight * fit.mean[j];
    });
  }
  const { test } = split;
  const error = new Float64Array(nTrained * windows.length);
  let baseline = 0;
  for (const position of test) baseline += (y[position] - mean) ** 2;
  const held = new Float64Array(test.length * p);
  const predicted = new Float64Array(test.length * nTrained);
  windows.forEach((_, j) => {
    const { x } = taskFeatures(input, taskOf(j).features, set.trials, 0, cache);
    test.forEach((position, row) => held.set(x.subarray(position * p, (position + 1) * p), row * p));
    linalg.gemm(
      'none',
      'none',
      test.length,
      nTrained,
      p,
      1,
      held,
      p,
      weights,
      nTrained,
      0,
      predicted,
      nTrained,
    );
    test.forEach((position, row) => {
      for (let i = 0; i < nTrained; i++) {
        const e = y[position] - predicted[row * nTrained + i] - intercepts[i];
        error[i * windows.length + j] += e * e;
      }
    });
  });
  return { error, baseline };
}
