import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { readoutWeights } from '@/lib/engine/crossval/readout-weights';
import type { Linalg } from '@/lib/engine/linalg/port';
import { gatherLabels } from '@/lib/engine/readout/gather-labels';
import { taskLabels, taskSetup } from '@/lib/engine/readout/task-data';
import type { ChunkCache, ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';

/**
 * Weights and patterns of one split's readout of the observed labels, one number a feature (0 for a dropped one).
 *
 * Weights w in label units per feature unit (spikes/s, or √count); patterns A = Cov(X)·w/Var(ŷ) in feature units per label
 * unit, covariance and variance over the training trials with 1/n, X as it was fitted (nuisance taken out where the readout
 * does so). Source: Haufe et al., NeuroImage 2014 (one target).
 */
export function runWeights(
  input: ReadoutInput,
  plan: ReadoutPlan,
  job: { task: number; split: number },
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const task = plan.tasks[job.task];
  const split = plan.foldSets[task.foldSet].splits[job.split];
  const setup = taskSetup(input, plan, task, split, cache, [split.repeat, split.fold], true);
  const fit = fitFold({ ...setup, keepsScaled: true }, linalg);
  const y = taskLabels(input, plan, task);
  const evaluated = evaluateLabels(fit, gatherLabels(y, 1, y.length, setup.train), 1, linalg);
  const scaledWeights = readoutWeights(fit, evaluated, 0, linalg);
  const weights = new Float64Array(fit.p);
  const pattern = new Float64Array(fit.p);
  const z = fit.scaledTrain;
  const p = fit.kept.length;
  if (z === undefined || p === 0) return { weights, pattern };
  const n = setup.train.length;
  const fitted = new Float64Array(n);
  linalg.gemm('none', 'none', n, 1, p, 1, z, p, scaledWeights, 1, 0, fitted, 1);
  const mean = fitted.reduce((sum, value) => sum + value, 0) / n;
  const deviation = fitted.map((value) => value - mean);
  const spread = deviation.reduce((sum, value) => sum + value * value, 0);
  const covariance = new Float64Array(p);
  linalg.gemm('none', 'none', 1, p, n, 1, deviation, n, z, p, 0, covariance, p);
  fit.kept.forEach((feature, j) => {
    weights[feature] = scaledWeights[j] / fit.sd[j];
    pattern[feature] = spread > 0 ? (fit.sd[j] * covariance[j]) / spread : 0;
  });
  return { weights, pattern };
}
