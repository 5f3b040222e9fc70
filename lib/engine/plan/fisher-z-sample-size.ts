import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { EngineError } from '@/lib/engine/engine-error';

/** A sample size before and after rounding up. */
export interface SampleSize {
  exact: number;
  n: number;
}

/**
 * Number of independent trials that finds a correlation with a wanted power.
 *
 * n = ((z₍1−α/sides₎ + z₍power₎)/artanh r)² + 3, rounded up.
 * Shapes: |r| in (0, 1), power and α in (0, 1). Mutates nothing. Never below 4. Throws EngineError outside these ranges.
 * Cost: two quantiles. Source: Fisher, Metron 1921; Cohen, Psychol. Bull. 1992.
 */
export function fisherZSampleSize(r: number, power = 0.8, alpha = 0.05, sides: 1 | 2 = 2): SampleSize {
  const size = Math.abs(r);
  if (!(size > 0 && size < 1)) {
    throw new EngineError('invalidOption', `A correlation to be found lies between 0 and 1, not at ${r}`);
  }
  if (!(power > 0 && power < 1) || !(alpha > 0 && alpha < 1)) {
    throw new EngineError('invalidOption', 'Power and α must lie between 0 and 1');
  }
  const z = normalQuantile(1 - alpha / sides, 0, 1) + normalQuantile(power, 0, 1);
  const exact = Math.max(0, z / Math.atanh(size)) ** 2 + 3;
  if (!Number.isFinite(exact))
    throw new EngineError('notEstimable', `A correlation of ${r} is too small to plan for`);
  return { exact, n: Math.max(4, Math.ceil(exact)) };
}
