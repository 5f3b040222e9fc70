import { perLevel } from '@/lib/engine/measures/per-level';
import { CollectedOutputs, type RepeatPredictions } from '@/lib/engine/readout/collected-outputs';
import { finishControls } from '@/lib/engine/readout/finish-controls';
import { finishViews } from '@/lib/engine/readout/finish-views';
import { heldOutNumbers } from '@/lib/engine/readout/held-out-numbers';
import { nestedInterval } from '@/lib/engine/readout/nested-interval';
import { nullNumbers } from '@/lib/engine/readout/null-numbers';
import { taskLabels } from '@/lib/engine/readout/task-data';
import { PlanBuilder } from '@/lib/engine/readout/plan-builder';
import type {
  ChunkOutput,
  EngineProblem,
  FoldNumbers,
  PredictionColumns,
  ReadoutInput,
  ReadoutNumbers,
  ReadoutPlan,
} from '@/lib/engine/readout/types';

/**
 * Puts the chunks' outputs together into a readout's numbers. `outputs` in any order, one for each chunk of the plan.
 * Pure; nothing passed in is changed. No number that comes out is NaN or infinite: what cannot be worked out is null.
 * Cost O(n·draws of the bootstrap) and the outputs' size.
 */
export function finishReadout(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: readonly ChunkOutput[],
): ReadoutNumbers {
  const collected = new CollectedOutputs(plan, outputs);
  const y = taskLabels(input, plan, plan.tasks[0]);
  const repeats = collected.predictions(0);
  const isBlocked = input.folds.kind === 'contiguous';
  const interval = nestedInterval(plan, collected, y, repeats);
  const heldOut = heldOutNumbers(y, repeats, isBlocked, interval, input.seed, 0);
  const perFold = foldNumbers(plan, collected, y);
  const mean = Float64Array.from(
    y,
    (_, i) => repeats.reduce((sum, r) => sum + r.predicted[i], 0) / repeats.length,
  );
  const control = nullNumbers(input.nullScheme.kind, heldOut.r2, collected.nullR2(0), plan.logArrangements);
  return {
    heldOut,
    perFold,
    perLevel: perLevel(y, mean),
    penalty: perFold.map(({ penalty }) => penalty),
    null: control,
    controls: finishControls(input, plan, collected, heldOut.r2, control?.p ?? null),
    views: finishViews(input, plan, collected),
    warnings: [...plan.warnings, ...foldWarnings(perFold)],
    nFeatures: new PlanBuilder(input).nFeatures(plan.tasks[0]),
    trialsUsed: plan.foldSets[0].trials,
    predictions: predictionColumns(plan, y, repeats),
  };
}

function foldNumbers(plan: ReadoutPlan, collected: CollectedOutputs, y: Float64Array): FoldNumbers[] {
  return plan.foldSets[0].splits.map((split, at) => {
    const values = collected.of({ kind: 'observed', task: 0, split: at });
    const predicted = collected.array(values, 'predicted');
    const reference = collected.array(values, 'baseline');
    let error = 0;
    let baseline = 0;
    split.test.forEach((position, i) => {
      error += (y[position] - predicted[i]) ** 2;
      baseline += (y[position] - reference[i]) ** 2;
    });
    return {
      repeat: split.repeat,
      fold: split.fold,
      nTrain: split.train.length,
      nTest: split.test.length,
      nPurged: split.nPurged,
      droppedFeatures: collected.number(values, 'droppedFeatures') ?? 0,
      penalty: collected.number(values, 'penalty'),
      components: collected.number(values, 'components'),
      atGridEdge: collected.number(values, 'atGridEdge') !== 0,
      r2: baseline > 0 ? 1 - error / baseline : null,
      rmse: split.test.length > 0 ? Math.sqrt(error / split.test.length) : null,
    };
  });
}

function foldWarnings(perFold: FoldNumbers[]): EngineProblem[] {
  const warnings: EngineProblem[] = [];
  const atEdge = perFold.filter(({ atGridEdge }) => atGridEdge);
  if (atEdge.length > 0) {
    const what = atEdge[0].penalty === null ? 'number of components' : 'penalty';
    warnings.push({
      code: 'choice-at-grid-edge',
      severity: 'warns',
      message: `The chosen ${what} lies at the edge of what was tried in ${atEdge.length} of ${perFold.length} folds; a better one may lie beyond.`,
      remedy:
        what === 'penalty'
          ? 'Widen the grid. A penalty at the upper edge is usual where the units carry nothing about the label.'
          : 'Allow more components.',
      place: {},
    });
  }
  const dropping = perFold.filter(({ droppedFeatures }) => droppedFeatures > 0);
  if (dropping.length > 0) {
    const most = Math.max(...dropping.map(({ droppedFeatures }) => droppedFeatures));
    warnings.push({
      code: 'features-dropped',
      severity: 'notes',
      message: `Up to ${most} ${most === 1 ? 'feature does' : 'features do'} not vary on the training trials of ${dropping.length} of ${perFold.length} folds and ${most === 1 ? 'is' : 'are'} left out there.`,
      place: {},
    });
  }
  return warnings;
}

function predictionColumns(
  plan: ReadoutPlan,
  y: Float64Array,
  repeats: RepeatPredictions[],
): PredictionColumns {
  const { trials } = plan.foldSets[0];
  const n = trials.length;
  const total = n * repeats.length;
  const columns: PredictionColumns = {
    window: new Int32Array(total),
    repeat: new Int32Array(total),
    fold: new Int32Array(total),
    trial: new Int32Array(total),
    label: new Float64Array(total),
    predicted: new Float64Array(total),
  };
  repeats.forEach(({ fold, predicted }, repeat) => {
    columns.repeat.fill(repeat, repeat * n, (repeat + 1) * n);
    columns.fold.set(fold, repeat * n);
    columns.trial.set(trials, repeat * n);
    columns.label.set(y, repeat * n);
    columns.predicted.set(predicted, repeat * n);
  });
  return columns;
}
