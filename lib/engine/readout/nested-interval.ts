import { nestedCvInterval, type NestedCvRepeat } from '@/lib/engine/measures/nested-cv-interval';
import type { CollectedOutputs, RepeatPredictions } from '@/lib/engine/readout/collected-outputs';
import type { IntervalNumbers, ReadoutPlan } from '@/lib/engine/readout/types';

/**
 * The nested-cross-validation interval of the main readout's R², from its pair fits; null where there are none (fewer
 * than three folds, or too many) or it cannot be worked out. `y` by position.
 */
export function nestedInterval(
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  y: Float64Array,
  repeats: RepeatPredictions[],
): IntervalNumbers | null {
  const { nFolds } = plan.foldSets[0];
  const n = y.length;
  const squares = (predicted: Float64Array): Float64Array => y.map((value, i) => (value - predicted[i]) ** 2);
  const parts: NestedCvRepeat[] = repeats.map(({ fold, predicted, baseline }) => ({
    nFolds,
    fold,
    squaredError: squares(predicted),
    squaredBaseline: squares(baseline),
    pairSquaredError: new Float64Array(nFolds * n),
    pairSquaredBaseline: new Float64Array(nFolds * n),
  }));
  let nPairs = 0;
  for (const { job } of plan.chunks) {
    if (job.kind !== 'pair') continue;
    nPairs++;
    const values = outputs.of(job);
    const positions = values.positions as Int32Array;
    const predicted = outputs.array(values, 'predicted');
    const baseline = outputs.array(values, 'baseline');
    const part = parts[job.repeat];
    positions.forEach((position, i) => {
      const other = part.fold[position] === job.foldA ? job.foldB : job.foldA;
      part.pairSquaredError[other * n + position] = (y[position] - predicted[i]) ** 2;
      part.pairSquaredBaseline[other * n + position] = (y[position] - baseline[i]) ** 2;
    });
  }
  if (nPairs === 0) return null;
  const found = nestedCvInterval(parts);
  return found === null
    ? null
    : { low: found.low, high: found.high, level: found.level, method: found.method };
}
