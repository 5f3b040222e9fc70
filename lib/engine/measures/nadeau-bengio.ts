import tCdf from '@stdlib/stats-base-dists-t-cdf';
import tQuantile from '@stdlib/stats-base-dists-t-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { mean } from '@/lib/engine/measures/mean';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import { variance } from '@/lib/engine/measures/variance';

/** The corrected resampled t test of two readouts on the same folds. */
export interface NadeauBengio {
  meanDifference: number;
  standardError: number;
  t: number | null;
  df: number;
  /** Two-sided; null where all differences are equal and t is not defined. */
  p: number | null;
  interval: Interval;
}

/**
 * Corrected resampled t test of two readouts on the same folds.
 *
 * t = d̄ / √(s²(1/J + n_test/n_train)), J = K·repeats differences, df = J − 1, s² their n − 1 variance.
 * Shapes: `differences` J, each a fold's mean squared error of readout A less that of B; `nTrain`, `nTest` the (mean)
 * trial numbers of a fold. Mutates nothing. Returns null for J < 2. With no variance: se 0, t and p null, the interval
 * is the single value. Throws EngineError for values that are not finite or trial numbers that are not positive.
 * Cost: a few passes over J. Source: Nadeau & Bengio, Mach. Learn. 2003.
 */
export function nadeauBengio(
  differences: ArrayLike<number>,
  nTrain: number,
  nTest: number,
  level = 0.95,
): NadeauBengio | null {
  requireNumbers('A fold difference', differences);
  requireLevel(level);
  if (!(nTrain > 0) || !(nTest > 0) || !Number.isFinite(nTrain + nTest)) {
    throw new EngineError('invalidOption', 'The numbers of training and test trials must be positive');
  }
  const count = differences.length;
  const centre = mean(differences);
  const s2 = variance(differences);
  if (centre === null || s2 === null) return null;
  const df = count - 1;
  const standardError = Math.sqrt(s2 * (1 / count + nTest / nTrain));
  const half = standardError * tQuantile(0.5 + level / 2, df);
  const t = standardError > 0 ? centre / standardError : null;
  return {
    meanDifference: centre,
    standardError,
    t: t !== null && Number.isFinite(t) ? t : null,
    df,
    p: t !== null && Number.isFinite(t) ? Math.min(1, 2 * tCdf(-Math.abs(t), df)) : null,
    interval: { low: centre - half, high: centre + half, level, method: 'corrected resampled t' },
  };
}
