import { fitFold } from '@/lib/engine/crossval/fit-fold';
import type { FoldFit } from '@/lib/engine/crossval/fold-fit';
import type { FoldSetup } from '@/lib/engine/crossval/fold-setup';
import type { Linalg } from '@/lib/engine/linalg/port';
import { taskSetup } from '@/lib/engine/readout/task-data';
import type { ChunkCache, FoldSplit, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';

/** A split's factorised fit with what it was made from. */
export interface SplitFit {
  setup: FoldSetup;
  fit: FoldFit;
}

/** The fit of one split of a task, kept in the cache: labels do not enter, so that all draws share it. */
export function fitSplit(
  input: ReadoutInput,
  plan: ReadoutPlan,
  taskIndex: number,
  splitIndex: number,
  linalg: Linalg,
  cache: ChunkCache,
): SplitFit {
  const key = `fit ${taskIndex} ${splitIndex}`;
  const kept = cache.get(key) as SplitFit | undefined;
  if (kept !== undefined) return kept;
  const task = plan.tasks[taskIndex];
  const split: FoldSplit = plan.foldSets[task.foldSet].splits[splitIndex];
  const setup = taskSetup(input, plan, task, split, cache, [split.repeat, split.fold]);
  const made: SplitFit = { setup, fit: fitFold(setup, linalg) };
  cache.set(key, made, made.fit.bytes);
  return made;
}
