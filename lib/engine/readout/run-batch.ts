import { fitFold } from '@/lib/engine/crossval/fit-fold';
import type { Linalg } from '@/lib/engine/linalg/port';
import { runObserved } from '@/lib/engine/readout/run-observed';
import { taskLabels, taskSetup } from '@/lib/engine/readout/task-data';
import type { ChunkCache, ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';

/** Held-out R² (mean over repeats, observed labels) of each of the tasks from…to: many small analyses in one chunk. */
export function runBatch(
  input: ReadoutInput,
  plan: ReadoutPlan,
  job: { from: number; to: number },
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const r2 = new Float64Array(job.to - job.from);
  for (let index = job.from; index < job.to; index++) {
    const task = plan.tasks[index];
    const set = plan.foldSets[task.foldSet];
    const y = taskLabels(input, plan, task);
    const error = new Float64Array(set.nRepeats);
    const baseline = new Float64Array(set.nRepeats);
    for (const split of set.splits) {
      const setup = taskSetup(input, plan, task, split, cache, [split.repeat, split.fold]);
      const values = runObserved(task, fitFold(setup, linalg), setup.train, y, linalg);
      const predicted = values.predicted as Float64Array;
      const reference = values.baseline as Float64Array;
      split.test.forEach((position, i) => {
        error[split.repeat] += (y[position] - predicted[i]) ** 2;
        baseline[split.repeat] += (y[position] - reference[i]) ** 2;
      });
    }
    let sum = 0;
    for (let repeat = 0; repeat < set.nRepeats; repeat++) sum += 1 - error[repeat] / baseline[repeat];
    r2[index - job.from] = sum / set.nRepeats;
  }
  return { r2 };
}
