import { mean } from '@/lib/engine/measures/mean';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** The line of label on prediction: label ≈ intercept + slope × predicted. */
export interface Calibration {
  slope: number;
  intercept: number;
}

/**
 * Calibration of held-out predictions: the least-squares line of label y on prediction ŷ.
 *
 * slope = Σ(ŷ − m)(y − ȳ)/Σ(ŷ − m)², intercept = ȳ − slope·m, with m the mean prediction. A slope below 1 means that
 * the predictions spread too far.
 * Shapes: `label`, `predicted` n; slope has no unit, intercept the label's. Mutates nothing.
 * Returns null when n < 2 or the predictions are constant to working precision. Throws EngineError on unequal lengths
 * or values that are not finite. Cost: three passes. Source: Copas, J. R. Stat. Soc. B 1983 (from memory).
 */
export function calibration(label: ArrayLike<number>, predicted: ArrayLike<number>): Calibration | null {
  const n = label.length;
  requireNumbers('The label', label);
  requireNumbers('The prediction', predicted, n);
  const my = mean(label);
  const mp = mean(predicted);
  if (my === null || mp === null || n < 2) return null;
  let spp = 0;
  let spy = 0;
  let scale = 0;
  for (let i = 0; i < n; i += 1) {
    const dp = predicted[i] - mp;
    spp += dp * dp;
    spy += dp * (label[i] - my);
    scale = Math.max(scale, Math.abs(predicted[i]));
  }
  const rounding = 4 * Number.EPSILON * scale;
  if (spp <= n * rounding * rounding) return null;
  const slope = spy / spp;
  const intercept = my - slope * mp;
  return Number.isFinite(slope) && Number.isFinite(intercept) ? { slope, intercept } : null;
}
