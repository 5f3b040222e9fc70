import normalCdf from '@stdlib/stats-base-dists-normal-cdf';
import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { EngineError } from '@/lib/engine/engine-error';

/**
 * Power to find a correlation with n independent trials.
 *
 * One-sided Φ(artanh(r)√(n − 3) − z₍1−α₎); two-sided the same with z₍1−α/2₎ for |r| (the far tail is left out).
 * Shapes: r in [−1, 1], n > 3 (need not be whole), α in (0, 1). Range [0, 1]. Mutates nothing. n ≤ 3 gives 0.
 * Throws EngineError outside these ranges. Cost: constant. Source: Fisher, Metron 1921.
 */
export function fisherZPower(r: number, n: number, alpha = 0.05, sides: 1 | 2 = 1): number {
  if (!(r >= -1 && r <= 1))
    throw new EngineError('invalidOption', `A correlation lies between −1 and 1, not at ${r}`);
  if (!(alpha > 0 && alpha < 1)) throw new EngineError('invalidOption', 'α must lie between 0 and 1');
  if (!(n > 3)) return 0;
  const signed = sides === 2 ? Math.abs(r) : r;
  if (Math.abs(signed) === 1) return signed === 1 ? 1 : 0;
  const power = normalCdf(
    Math.atanh(signed) * Math.sqrt(n - 3) - normalQuantile(1 - alpha / sides, 0, 1),
    0,
    1,
  );
  return Math.max(0, Math.min(1, power));
}
