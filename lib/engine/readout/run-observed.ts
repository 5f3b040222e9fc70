import { evaluateLabels, type EvaluatedLabels } from '@/lib/engine/crossval/evaluate-labels';
import type { FoldFit } from '@/lib/engine/crossval/fold-fit';
import type { Linalg } from '@/lib/engine/linalg/port';
import { gatherLabels } from '@/lib/engine/readout/gather-labels';
import type { ChunkOutput, Task } from '@/lib/engine/readout/types';

/**
 * What held-out squared errors are measured against: the training mean, or what nuisance alone predicts where the task
 * asks what the units add to it.
 */
export function baselineOf(task: Task, evaluated: EvaluatedLabels, row: number, nTest: number): Float64Array {
  if (task.design.kind === 'incremental' || task.design.kind === 'adjusted') {
    return evaluated.basePredicted.subarray(row * nTest, (row + 1) * nTest);
  }
  return new Float64Array(nTest).fill(evaluated.trainMean[row]);
}

/** Held-out predictions of one split for the observed labels `y` (by position), with what was chosen. */
export function runObserved(
  task: Task,
  fit: FoldFit,
  train: Int32Array,
  y: Float64Array,
  linalg: Linalg,
): ChunkOutput['values'] {
  const evaluated = evaluateLabels(fit, gatherLabels(y, 1, y.length, train), 1, linalg);
  const l = evaluated.choice[0];
  const chosen = fit.candidates[l];
  const isComponents = chosen.components !== null;
  // The fewest components are no edge: nothing simpler exists.
  const isEdge =
    fit.isGrid &&
    fit.candidates.length > 1 &&
    (l === fit.candidates.length - 1 || (l === 0 && !isComponents));
  const values: ChunkOutput['values'] = {
    predicted: evaluated.predicted,
    baseline: baselineOf(task, evaluated, 0, fit.factor.nTest).slice(),
    trainMean: evaluated.trainMean[0],
    nTrain: train.length,
    droppedFeatures: fit.p - fit.kept.length,
    atGridEdge: isEdge ? (l === 0 ? 1 : -1) : 0,
  };
  if (chosen.penalty !== null) values.penalty = chosen.penalty;
  if (chosen.components !== null) values.components = chosen.components;
  return values;
}
