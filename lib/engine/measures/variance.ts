import { mean } from '@/lib/engine/measures/mean';

/**
 * Sample variance about the sample mean.
 *
 * s² = [Σ(x − x̄)² − (Σ(x − x̄))²/n] / (n − ddof).
 * Shapes: `values` n; `ddof` 1 (unbiased, the default) or 0 (1/n). Unit: that of `values`, squared. Mutates nothing.
 * Returns null when n ≤ ddof. Cost: three passes.
 * Source: corrected two-pass algorithm, Chan, Golub & LeVeque, Am. Stat. 1983.
 */
export function variance(values: ArrayLike<number>, ddof: 0 | 1 = 1): number | null {
  const n = values.length;
  const centre = mean(values);
  if (centre === null || n <= ddof) return null;
  let squares = 0;
  let rest = 0;
  for (let i = 0; i < n; i += 1) {
    const d = values[i] - centre;
    squares += d * d;
    rest += d;
  }
  return Math.max(0, squares - (rest * rest) / n) / (n - ddof);
}
