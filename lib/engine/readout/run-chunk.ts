import type { Linalg } from '@/lib/engine/linalg/port';
import { fitSplit } from '@/lib/engine/readout/fit-split';
import { runBatch } from '@/lib/engine/readout/run-batch';
import { runDraws } from '@/lib/engine/readout/run-draws';
import { runGeneralisation } from '@/lib/engine/readout/run-generalisation';
import { runInjection } from '@/lib/engine/readout/run-injection';
import { runObserved } from '@/lib/engine/readout/run-observed';
import { runPair } from '@/lib/engine/readout/run-pair';
import { runWeights } from '@/lib/engine/readout/run-weights';
import { taskDraws, taskLabels } from '@/lib/engine/readout/task-data';
import type { Chunk, ChunkCache, ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';

/**
 * Carries out one chunk of a plan. Pure: the same input, plan and chunk give the same bits on one backend, in whatever
 * thread and order chunks run and whatever the cache holds. `cache` belongs to one thread and one plan.
 *
 * Throws EngineError where the data do not allow the step, in words that a person can read.
 * Cost: about `chunk.weight` flops, plus the factorisation where the cache does not hold it.
 */
export function runChunk(
  input: ReadoutInput,
  plan: ReadoutPlan,
  chunk: Chunk,
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput {
  return { id: chunk.id, values: valuesOf(input, plan, chunk, linalg, cache) };
}

function valuesOf(
  input: ReadoutInput,
  plan: ReadoutPlan,
  chunk: Chunk,
  linalg: Linalg,
  cache: ChunkCache,
): ChunkOutput['values'] {
  const { job } = chunk;
  switch (job.kind) {
    case 'observed': {
      const task = plan.tasks[job.task];
      const { setup, fit } = fitSplit(input, plan, job.task, job.split, linalg, cache);
      return runObserved(task, fit, setup.train, taskLabels(input, plan, task), linalg);
    }
    case 'draws': {
      const task = plan.tasks[job.task];
      const { setup, fit } = fitSplit(input, plan, job.task, job.split, linalg, cache);
      const rows = taskDraws(input, plan, task, job.from, job.to, linalg, cache);
      return runDraws(task, fit, setup.train, setup.test, rows, job.to - job.from, linalg);
    }
    case 'pair':
      return runPair(input, plan, job, linalg, cache);
    case 'batch':
      return runBatch(input, plan, job, linalg, cache);
    case 'weights':
      return runWeights(input, plan, job, linalg, cache);
    case 'generalisation':
      return runGeneralisation(input, plan, job, linalg, cache);
    case 'injection':
      return runInjection(input, plan, job, linalg, cache);
  }
}
