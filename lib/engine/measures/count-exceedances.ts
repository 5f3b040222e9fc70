import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/**
 * Number of null draws that count against the observed value.
 *
 * A draw counts when R²_b ≥ R² − 1e-12·max(1, |R²|): draws that tie with the observed value up to rounding count.
 * Shapes: `draws` B finite values. Mutates nothing. Throws EngineError when a value is not finite. Cost: one pass.
 * Source: ties count (Phipson & Smyth, Stat. Appl. Genet. Mol. Biol. 2010); the tolerance is this engine's own.
 */
export function countExceedances(observed: number, draws: ArrayLike<number>): number {
  requireNumbers('The observed value', [observed]);
  requireNumbers('A null draw', draws);
  const bar = observed - 1e-12 * Math.max(1, Math.abs(observed));
  let count = 0;
  for (let b = 0; b < draws.length; b += 1) if (draws[b] >= bar) count += 1;
  return count;
}
