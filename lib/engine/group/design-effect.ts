import { EngineError } from '@/lib/engine/engine-error';

/**
 * Design effect of sessions (or trials) that are clustered in animals: by how much the variance of a flat mean is underestimated.
 *
 * 1 + (m − 1)·ICC; N clustered values are worth N/deff independent ones.
 * Shapes: m ≥ 1 values a cluster, ICC in [−1, 1]. Mutates nothing. Returns null where the result is not positive (an ICC below
 * −1/(m − 1), which no population has). Throws EngineError outside these ranges. Cost: constant. Source: Kish, Survey Sampling 1965.
 */
export function designEffect(valuesPerCluster: number, icc: number): number | null {
  if (!(valuesPerCluster >= 1) || !Number.isFinite(valuesPerCluster) || !(icc >= -1 && icc <= 1)) {
    throw new EngineError('invalidOption', `${valuesPerCluster} values a cluster at ICC ${icc} is no design`);
  }
  const effect = 1 + (valuesPerCluster - 1) * icc;
  return effect > 0 ? effect : null;
}
