import { requirePValues } from '@/lib/engine/measures/require-p-values';

/**
 * Holm adjusted p values (family-wise error, step-down).
 *
 * p̃₍ᵢ₎ = max over j ≤ i of min(1, (m − j + 1) p₍ⱼ₎); reject where p̃ ≤ α.
 * Shapes: `pValues` m in [0, 1] → m in the same order. Mutates nothing. m = 0 → [].
 * Throws EngineError for a value outside [0, 1]. Cost: m log m.
 * Source: Holm, Scand. J. Stat. 1979.
 */
export function holm(pValues: ArrayLike<number>): number[] {
  requirePValues(pValues);
  const m = pValues.length;
  const order = Array.from({ length: m }, (_, i) => i).sort((a, b) => pValues[a] - pValues[b]);
  const adjusted = new Array<number>(m);
  let most = 0;
  for (let i = 0; i < m; i += 1) {
    most = Math.max(most, Math.min(1, (m - i) * pValues[order[i]]));
    adjusted[order[i]] = most;
  }
  return adjusted;
}
