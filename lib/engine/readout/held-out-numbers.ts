import { bcaInterval } from '@/lib/engine/measures/bca-interval';
import { calibration } from '@/lib/engine/measures/calibration';
import { effectiveTrials } from '@/lib/engine/measures/effective-trials';
import { mae } from '@/lib/engine/measures/mae';
import { pearson } from '@/lib/engine/measures/pearson';
import { rmse } from '@/lib/engine/measures/rmse';
import { spearman } from '@/lib/engine/measures/spearman';
import { randomSource } from '@/lib/engine/random/random-source';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { RepeatPredictions } from '@/lib/engine/readout/collected-outputs';
import type { HeldOutNumbers, IntervalNumbers } from '@/lib/engine/readout/types';

/** Mean of what could be worked out; null where nothing could. */
export function meanOfKnown(values: (number | null)[]): number | null {
  const known = values.filter((value): value is number => value !== null && Number.isFinite(value));
  return known.length === 0 ? null : known.reduce((a, b) => a + b, 0) / known.length;
}

/** Held-out R² of one repeat, pooled over its held-out trials; null without spread about the baseline. */
export function pooledR2(y: Float64Array, repeat: RepeatPredictions): number | null {
  let error = 0;
  let baseline = 0;
  for (let i = 0; i < y.length; i++) {
    if (repeat.fold[i] < 0) continue;
    error += (y[i] - repeat.predicted[i]) ** 2;
    baseline += (y[i] - repeat.baseline[i]) ** 2;
  }
  return baseline > 0 ? 1 - error / baseline : null;
}

/** Mean over the repeats of each trial's squared error and squared baseline deviation, over held-out positions. */
export function trialLosses(
  y: Float64Array,
  repeats: RepeatPredictions[],
): { squaredError: Float64Array; squaredBaseline: Float64Array } {
  const positions = heldPositions(repeats);
  const mean = (of: (repeat: RepeatPredictions, i: number) => number): Float64Array =>
    Float64Array.from(
      positions,
      (i) => repeats.reduce((sum, repeat) => sum + of(repeat, i), 0) / repeats.length,
    );
  return {
    squaredError: mean((repeat, i) => (y[i] - repeat.predicted[i]) ** 2),
    squaredBaseline: mean((repeat, i) => (y[i] - repeat.baseline[i]) ** 2),
  };
}

/** Positions that some fold held out (the same in every repeat). */
export function heldPositions(repeats: RepeatPredictions[]): number[] {
  return Array.from(repeats[0].fold.keys()).filter((i) => repeats[0].fold[i] >= 0);
}

/**
 * All measures of held-out predictions, each worked out in every repeat and averaged over the repeats.
 * `y` by position. `stream` tells the bootstrap of one analysis from another's.
 */
export function heldOutNumbers(
  y: Float64Array,
  repeats: RepeatPredictions[],
  isBlocked: boolean,
  r2Interval: IntervalNumbers | null,
  seed: number,
  stream: number,
): HeldOutNumbers {
  const positions = heldPositions(repeats);
  const label = Float64Array.from(positions, (i) => y[i]);
  const predicted = repeats.map((repeat) => Float64Array.from(positions, (i) => repeat.predicted[i]));
  const over = (measure: (prediction: Float64Array) => number | null): number | null =>
    meanOfKnown(predicted.map(measure));
  const { squaredError, squaredBaseline } = trialLosses(y, repeats);
  const random = randomSource(splitGenerator(seed, 'bootstrap', stream));
  return {
    r2: meanOfKnown(repeats.map((repeat) => pooledR2(y, repeat))),
    r2Interval,
    testTrialInterval: bcaInterval(squaredError, squaredBaseline, random, { blocks: isBlocked }),
    r: over((prediction) => pearson(label, prediction)),
    rho: over((prediction) => spearman(label, prediction)),
    rmse: over((prediction) => rmse(label, prediction)),
    mae: over((prediction) => mae(label, prediction)),
    calibrationSlope: over((prediction) => calibration(label, prediction)?.slope ?? null),
    calibrationIntercept: over((prediction) => calibration(label, prediction)?.intercept ?? null),
    nTrials: positions.length,
    effectiveTrials: over(
      (prediction) =>
        effectiveTrials(
          label,
          label.map((value, i) => value - prediction[i]),
        )?.nEffective ?? null,
    ),
  };
}
