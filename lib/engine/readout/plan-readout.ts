import { planDraws } from '@/lib/engine/controls/plan-draws';
import { checkInput } from '@/lib/engine/readout/check-input';
import { makeFoldSet } from '@/lib/engine/readout/make-fold-set';
import { mainDesign, mainFeatures } from '@/lib/engine/readout/main-task';
import { PlanBuilder } from '@/lib/engine/readout/plan-builder';
import { planControls } from '@/lib/engine/readout/plan-controls';
import { planViews } from '@/lib/engine/readout/plan-views';
import type { EngineProblem, PlanResult, ReadoutInput, Task } from '@/lib/engine/readout/types';

/** Most folds for which the nested-cross-validation interval (K(K − 1)/2 more fits) is worked out. */
const MOST_FOLDS_FOR_INTERVAL = 20;
/** Sustained flops a second of one core with the native backend, for the estimate. */
const FLOPS_A_SECOND = 2.5e10;

/**
 * Turns a readout into a plan: who is in which fold, which analyses are needed, and the chunks that carry them out, with
 * an estimate of flops, bytes and seconds; or the problems that stop it, in words.
 *
 * Pure and cheap (no counts are read): O(n log n) a repeat and O(chunks). Nothing passed in is changed.
 */
export function planReadout(input: ReadoutInput): PlanResult {
  const problems: EngineProblem[] = checkInput(input);
  if (problems.some(({ severity }) => severity === 'stops')) return { ok: false, problems };
  const trials = cutToSessions(input, problems);
  const made = makeFoldSet(input.y, trials, input.folds, input.nTrials, input.labelName, input.seed);
  problems.push(...made.problems);
  if (made.set === null) return { ok: false, problems };
  const y = Float64Array.from(trials, (trial) => input.y[trial]);
  const draws = planDraws(input.nullScheme, y, trials, input.nTrials);
  problems.push(...draws.problems);
  if (problems.some(({ severity }) => severity === 'stops')) return { ok: false, problems };

  const builder = new PlanBuilder(input);
  builder.addFoldSet(made.set);
  const main: Task = {
    name: 'main',
    control: -1,
    view: -1,
    item: 0,
    features: mainFeatures(input),
    design: mainDesign(input),
    draws: draws.nDraws,
    foldSet: 0,
  };
  builder.addTask(main);
  builder.addSplitChunks(0, 'Held-out predictions', 'Shuffled control');
  addPairs(builder);
  planControls(input, builder, draws.nDraws);
  planViews(input, builder, draws.nDraws);

  const p = builder.nFeatures(main);
  const n = trials.length;
  const flops = builder.chunks.reduce((sum, chunk) => sum + chunk.weight, 0);
  const bytes = 2 * builder.fitBytes + 8 * (2 * n * p + 4 * 256 * n + Math.min(draws.nDraws, 4096) * n);
  return {
    ok: true,
    plan: {
      foldSets: builder.foldSets,
      tasks: builder.tasks,
      chunks: builder.chunks,
      nDraws: draws.nDraws,
      logArrangements: draws.logArrangements,
      warnings: problems,
      estimate: { flops, bytes, seconds: flops / FLOPS_A_SECOND + 2e-4 * builder.chunks.length },
    },
  };
}

/** With other sessions' label sequences, only as many trials as the shortest of them has take part. */
function cutToSessions(input: ReadoutInput, problems: EngineProblem[]): Int32Array {
  if (input.nullScheme.kind !== 'sessions') return input.trialIndex;
  const shortest = input.nullScheme.sequences.reduce((least, row) => Math.min(least, row.length), Infinity);
  if (shortest >= input.trialIndex.length) return input.trialIndex;
  problems.push({
    code: 'trials-cut-to-shortest-session',
    severity: 'warns',
    message: `Only the first ${shortest} of ${input.trialIndex.length} trials take part: the shortest of the other sessions has no more labels.`,
    place: {},
  });
  return input.trialIndex.slice(0, shortest);
}

function addPairs(builder: PlanBuilder): void {
  const set = builder.foldSets[0];
  if (set.nFolds < 3 || set.nFolds > MOST_FOLDS_FOR_INTERVAL) return;
  const nTest = (2 * set.trials.length) / set.nFolds;
  const cost = builder.cost(builder.tasks[0], set.trials.length - nTest, nTest);
  for (let repeat = 0; repeat < set.nRepeats; repeat++) {
    for (let foldA = 0; foldA < set.nFolds; foldA++) {
      for (let foldB = foldA + 1; foldB < set.nFolds; foldB++) {
        builder.addChunk('Interval', cost.fit + cost.label, `pair ${repeat} ${foldA} ${foldB}`, {
          kind: 'pair',
          task: 0,
          repeat,
          foldA,
          foldB,
        });
      }
    }
  }
}
