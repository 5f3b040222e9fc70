/**
 * Arithmetic mean with one correction step, so that a large common offset costs no digits.
 *
 * m₀ = Σx/n; m = m₀ + Σ(x − m₀)/n.
 * Shapes: `values` n, any finite unit. Mutates nothing. Returns null for an empty array.
 * Cost: two passes. Source: the corrected two-pass mean, Chan, Golub & LeVeque, Am. Stat. 1983.
 */
export function mean(values: ArrayLike<number>): number | null {
  const n = values.length;
  if (n === 0) return null;
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += values[i];
  const first = sum / n;
  let rest = 0;
  for (let i = 0; i < n; i += 1) rest += values[i] - first;
  return first + rest / n;
}
