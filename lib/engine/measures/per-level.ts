import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { mean } from '@/lib/engine/measures/mean';
import { meanInterval } from '@/lib/engine/measures/mean-interval';
import { quantileOfSorted } from '@/lib/engine/measures/quantile-of-sorted';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import { variance } from '@/lib/engine/measures/variance';

/** What the held-out predictions do at one level of the label (or in one quantile group). */
export interface LevelSummary {
  /** The level; for quantile groups the mean label of the group. */
  level: number;
  nTrials: number;
  meanPredicted: number;
  /** n − 1 standard deviation; null for a single trial. */
  sdPredicted: number | null;
  /** Mean of ŷ − y. */
  bias: number;
  /** t interval of the mean prediction; null for a single trial. */
  meanInterval: Interval | null;
}

/** How the label is cut up: up to `maxLevels` distinct values are levels, more are `quantileGroups` groups. */
export interface PerLevelOptions {
  maxLevels?: number;
  quantileGroups?: number;
  level?: number;
}

/**
 * Mean, spread, bias and t interval of the predictions at each level of the label, in ascending order.
 *
 * A label with at most `maxLevels` (12) distinct values is taken level by level. A continuous one is cut at its type-7
 * quantiles into at most `quantileGroups` (5) groups (a value equal to an edge goes to the lower group); groups that
 * ties leave empty are left out.
 * Shapes: `label`, `predicted` n → one row a level, ascending. Units: the label's. Mutates nothing. n = 0 → [].
 * Throws EngineError on unequal lengths, values that are not finite or a count below 1. Cost: n log n.
 * Source: definitions of lib/engine/measures/mean, variance and mean-interval; quantiles of Hyndman & Fan 1996 (7).
 */
export function perLevel(
  label: ArrayLike<number>,
  predicted: ArrayLike<number>,
  options: PerLevelOptions = {},
): LevelSummary[] {
  const { maxLevels = 12, quantileGroups = 5, level = 0.95 } = options;
  const n = label.length;
  requireNumbers('The label', label);
  requireNumbers('The prediction', predicted, n);
  if (
    !Number.isInteger(maxLevels) ||
    maxLevels < 0 ||
    !Number.isInteger(quantileGroups) ||
    quantileGroups < 1
  ) {
    throw new EngineError(
      'invalidOption',
      'The number of levels and of quantile groups must be whole and positive',
    );
  }
  if (n === 0) return [];
  const sorted = Float64Array.from(label).sort();
  const distinct = sorted.filter((value, i) => i === 0 || value !== sorted[i - 1]);
  const isLevels = distinct.length <= maxLevels;
  const edges = isLevels
    ? Array.from(distinct)
    : Array.from({ length: quantileGroups }, (_, g) => quantileOfSorted(sorted, (g + 1) / quantileGroups));
  const members: number[][] = edges.map(() => []);
  for (let i = 0; i < n; i += 1) members[firstNotBelow(edges, label[i])].push(i);
  return members.filter((rows) => rows.length > 0).map((rows) => summarise(rows, label, predicted, level));
}

/** Index of the first ascending edge that is at least `value`; the last edge is the maximum, so one is found. */
function firstNotBelow(edges: readonly number[], value: number): number {
  let low = 0;
  let high = edges.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (edges[middle] >= value) high = middle;
    else low = middle + 1;
  }
  return low;
}

function summarise(
  rows: readonly number[],
  label: ArrayLike<number>,
  predicted: ArrayLike<number>,
  level: number,
): LevelSummary {
  const labels = rows.map((i) => label[i]);
  const values = rows.map((i) => predicted[i]);
  const s2 = variance(values);
  const isOneLevel = labels.every((value) => value === labels[0]);
  return {
    level: isOneLevel ? labels[0] : (mean(labels) ?? 0),
    nTrials: rows.length,
    meanPredicted: mean(values) ?? 0,
    sdPredicted: s2 === null ? null : Math.sqrt(s2),
    bias: mean(rows.map((i) => predicted[i] - label[i])) ?? 0,
    meanInterval: meanInterval(values, level),
  };
}
