import { EngineError } from '@/lib/engine/engine-error';

/** Leave-one-out replicates of a statistic and what follows from them. */
export interface Jackknife {
  /** The statistic without row (or block) i. */
  values: Float64Array;
  mean: number;
  standardError: number;
  bias: number;
  /** Efron's acceleration; 0 where the replicates do not vary. */
  acceleration: number;
}

/**
 * Jackknife of any statistic over n rows (or blocks).
 *
 * With θ₍ᵢ₎ the statistic without row i, θ₍·₎ their mean and d = θ₍·₎ − θ₍ᵢ₎:
 * se = √((n − 1)/n Σd²), bias = (n − 1)(θ₍·₎ − θ), acceleration = Σd³ / (6 (Σd²)^1.5).
 * Shapes: n ≥ 2 rows; `observed` the statistic of all rows; `without(i)` the statistic without row i (0-based), null
 * where it is not defined. Mutates nothing of the caller's. Returns null when any replicate is null or not finite.
 * Throws EngineError `notEstimable` for n < 2. Cost: n calls of `without`.
 * Source: Efron, Ann. Stat. 1979; Efron, J. Am. Stat. Assoc. 1987 (acceleration).
 */
export function jackknife(
  n: number,
  observed: number,
  without: (row: number) => number | null,
): Jackknife | null {
  if (!(n >= 2)) throw new EngineError('notEstimable', `A jackknife needs at least 2 rows, not ${n}`);
  const values = new Float64Array(n);
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const value = without(i);
    if (value === null || !Number.isFinite(value)) return null;
    values[i] = value;
    sum += value;
  }
  const centre = sum / n;
  let scale = 0;
  for (let i = 0; i < n; i += 1) scale = Math.max(scale, Math.abs(centre - values[i]));
  // Below the rounding of the mean the differences are noise; cubes of scaled differences cannot underflow.
  const isConstant = scale <= 8 * Number.EPSILON * Math.abs(centre);
  let squares = 0;
  let cubes = 0;
  for (let i = 0; i < n && !isConstant; i += 1) {
    const d = (centre - values[i]) / scale;
    squares += d * d;
    cubes += d * d * d;
  }
  return {
    values,
    mean: centre,
    standardError: isConstant ? 0 : scale * Math.sqrt(((n - 1) / n) * squares),
    bias: (n - 1) * (centre - observed),
    acceleration: isConstant ? 0 : cubes / (6 * squares ** 1.5),
  };
}
