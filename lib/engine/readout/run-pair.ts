import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import type { Linalg } from '@/lib/engine/linalg/port';
import { runObserved } from '@/lib/engine/readout/run-observed';
import { taskLabels, taskSetup } from '@/lib/engine/readout/task-data';
import type {
  ChunkCache,
  ChunkOutput,
  FoldSplit,
  ReadoutInput,
  ReadoutPlan,
} from '@/lib/engine/readout/types';

/**
 * Predictions of two folds by one readout that was trained on neither: the whole pipeline again, purge gap and choice of
 * penalty included, for the nested-cross-validation interval. `positions` says which trials they belong to.
 */
export function runPair(
  input: ReadoutInput,
  plan: ReadoutPlan,
  job: { task: number; repeat: number; foldA: number; foldB: number },
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const task = plan.tasks[job.task];
  const set = plan.foldSets[task.foldSet];
  const folds = [job.foldA, job.foldB];
  const parts = splitPositions(set.foldOf[job.repeat], folds, set.trials, set.purgeTrials);
  const split: FoldSplit = { repeat: job.repeat, fold: -1, ...parts };
  const setup = taskSetup(input, plan, task, split, cache, [job.repeat, job.foldA, job.foldB]);
  const fit = fitFold(setup, linalg);
  const y = taskLabels(input, plan, task);
  const { predicted, baseline } = runObserved(task, fit, setup.train, y, linalg);
  return { positions: split.test, predicted, baseline };
}
