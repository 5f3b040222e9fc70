import fQuantile from '@stdlib/stats-base-dists-f-quantile';
import type { Interval } from '@/lib/engine/measures/interval';

/**
 * F-based interval of a single-measure intraclass correlation.
 *
 * With F = MSB/MSW: low = (F/F_q(df_b, df_w) − 1)/(F/F_q + k − 1), high with F·F_q(df_w, df_b), q = (1 + level)/2.
 * Shapes: mean squares ≥ 0, degrees of freedom > 0 (need not be whole), k ≥ 2 measures a target. Range [−1/(k − 1), 1].
 * Mutates nothing. MSW = 0 with MSB > 0 gives [1, 1]; both 0 gives null. Inputs are assumed checked. Cost: two quantiles.
 * Source: Shrout & Fleiss, Psychol. Bull. 1979, p. 424 (page from memory).
 */
export function iccInterval(
  between: number,
  within: number,
  dfBetween: number,
  dfWithin: number,
  measures: number,
  level: number,
  method: string,
): Interval | null {
  if (within === 0) return between > 0 ? { low: 1, high: 1, level, method } : null;
  const f = between / within;
  const q = 0.5 + level / 2;
  const lower = f / fQuantile(q, dfBetween, dfWithin);
  const upper = f * fQuantile(q, dfWithin, dfBetween);
  if (!Number.isFinite(lower)) return null;
  return {
    low: (lower - 1) / (lower + measures - 1),
    high: Number.isFinite(upper) ? (upper - 1) / (upper + measures - 1) : 1,
    level,
    method,
  };
}
