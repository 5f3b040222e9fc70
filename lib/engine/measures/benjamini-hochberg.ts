import { requirePValues } from '@/lib/engine/measures/require-p-values';

/**
 * Benjamini–Hochberg adjusted p values (false discovery rate, step-up).
 *
 * p̃₍ᵢ₎ = min over j ≥ i of min(1, m p₍ⱼ₎/j); reject where p̃ ≤ q.
 * Shapes: `pValues` m in [0, 1] → m in the same order. Mutates nothing. m = 0 → [].
 * Throws EngineError for a value outside [0, 1]. Cost: m log m.
 * Source: Benjamini & Hochberg, J. R. Stat. Soc. B 1995.
 */
export function benjaminiHochberg(pValues: ArrayLike<number>): number[] {
  requirePValues(pValues);
  const m = pValues.length;
  const order = Array.from({ length: m }, (_, i) => i).sort((a, b) => pValues[a] - pValues[b]);
  const adjusted = new Array<number>(m);
  let least = 1;
  for (let i = m - 1; i >= 0; i -= 1) {
    least = Math.min(least, (m * pValues[order[i]]) / (i + 1));
    adjusted[order[i]] = least;
  }
  return adjusted;
}
