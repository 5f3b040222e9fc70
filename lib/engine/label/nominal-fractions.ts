import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Nominal shared-motion fraction from the strengths that the stimulus was made with.
 *
 * λ_shared² / (λ_shared² + λ_own²).
 * Shapes: `shared`, `own` n strengths (amplitudes, any common unit) → n values in [0, 1], null where both are 0.
 * Mutates nothing. Throws EngineError on unequal lengths or values that are not finite. Cost: one pass.
 * Source: definition (share of variance, for a shared and an own component of unit variance).
 */
export function nominalFractions(shared: ArrayLike<number>, own: ArrayLike<number>): (number | null)[] {
  requireNumbers('The shared strength', shared);
  requireNumbers('The own strength', own, shared.length);
  return Array.from({ length: shared.length }, (_, i) => {
    // Scaled, so that squares neither overflow nor vanish.
    const scale = Math.max(Math.abs(shared[i]), Math.abs(own[i]));
    if (scale === 0) return null;
    const s = (shared[i] / scale) ** 2;
    return s / (s + (own[i] / scale) ** 2);
  });
}
