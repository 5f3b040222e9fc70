import { EngineError } from '@/lib/engine/engine-error';
import { iccInterval } from '@/lib/engine/label/icc-interval';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** Intraclass correlations of single measures (icc1, icc3) and of the mean of k (icc1Mean, icc3Mean). */
export interface IntraclassCorrelation {
  icc1: number;
  icc3: number;
  /** null where the mean squares leave a ratio without a value (MSB = 0). */
  icc1Mean: number | null;
  icc3Mean: number | null;
  meanSquareTargets: number;
  meanSquareWithin: number;
  meanSquareMeasures: number;
  meanSquareResidual: number;
  icc1Interval: Interval | null;
  icc3Interval: Interval | null;
}

/**
 * Plain intraclass correlations of targets × measures.
 *
 * ICC(1) = (MSB − MSW)/(MSB + (k − 1)MSW); ICC(3) = (MSB − MSE)/(MSB + (k − 1)MSE); of k-measure means: (MSB − MSW)/MSB and
 * (MSB − MSE)/MSB. MSB between targets (df n − 1), MSW within (df n(k − 1)), MSE after the measures' means (df (n − 1)(k − 1)).
 * Shapes: `matrix` nTargets × nMeasures row-major, both at least 2. Range [−1/(k − 1), 1]. Mutates nothing.
 * Returns null when nothing varies. Throws EngineError on shapes that disagree or values that are not finite.
 * Cost: O(nk). Source: Shrout & Fleiss, Psychol. Bull. 1979.
 */
export function intraclassCorrelation(
  matrix: ArrayLike<number>,
  nTargets: number,
  nMeasures: number,
  level = 0.95,
): IntraclassCorrelation | null {
  requireLevel(level);
  if (!Number.isInteger(nTargets) || !Number.isInteger(nMeasures) || nTargets < 2 || nMeasures < 2) {
    throw new EngineError(
      'notEstimable',
      'An intraclass correlation needs at least 2 targets and 2 measures of each',
    );
  }
  requireNumbers('A measure', matrix, nTargets * nMeasures);
  const n = nTargets;
  const k = nMeasures;
  let grand = 0;
  for (let c = 0; c < n * k; c += 1) grand += matrix[c] / (n * k);
  const byTarget = new Float64Array(n);
  const byMeasure = new Float64Array(k);
  let scale = 0;
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < k; j += 1) {
      const d = matrix[i * k + j] - grand;
      byTarget[i] += d / k;
      byMeasure[j] += d / n;
      scale = Math.max(scale, Math.abs(matrix[i * k + j]));
    }
  }
  let between = 0;
  let measures = 0;
  let within = 0;
  let residual = 0;
  for (let i = 0; i < n; i += 1) between += k * byTarget[i] * byTarget[i];
  for (let j = 0; j < k; j += 1) measures += n * byMeasure[j] * byMeasure[j];
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < k; j += 1) {
      const d = matrix[i * k + j] - grand - byTarget[i];
      within += d * d;
      residual += (d - byMeasure[j]) * (d - byMeasure[j]);
    }
  }
  const rounding = (4 * Number.EPSILON * scale) ** 2 * n * k;
  const settle = (squares: number, df: number): number => (squares <= rounding ? 0 : squares / df);
  const msb = settle(between, n - 1);
  const msw = settle(within, n * (k - 1));
  const mse = settle(residual, (n - 1) * (k - 1));
  const spread1 = msb + (k - 1) * msw;
  const spread3 = msb + (k - 1) * mse;
  if (!(spread1 > 0) || !(spread3 > 0) || !Number.isFinite(spread1 + spread3)) return null;
  return {
    icc1: (msb - msw) / spread1,
    icc3: (msb - mse) / spread3,
    icc1Mean: msb > 0 ? (msb - msw) / msb : null,
    icc3Mean: msb > 0 ? (msb - mse) / msb : null,
    meanSquareTargets: msb,
    meanSquareWithin: msw,
    meanSquareMeasures: settle(measures, k - 1),
    meanSquareResidual: mse,
    icc1Interval: iccInterval(msb, msw, n - 1, n * (k - 1), k, level, 'F, ICC(1)'),
    icc3Interval: iccInterval(msb, mse, n - 1, (n - 1) * (k - 1), k, level, 'F, ICC(3)'),
  };
}
