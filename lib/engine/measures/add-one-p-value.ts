import { EngineError } from '@/lib/engine/engine-error';

/**
 * Monte Carlo permutation p value.
 *
 * p = (b + 1)/(B + 1), b the draws at least as large as the observed value, B all draws. Never 0.
 * Shapes: whole numbers, 0 ≤ b ≤ B, B ≥ 1. Mutates nothing. Throws EngineError otherwise. Cost: constant.
 * Source: Phipson & Smyth, Stat. Appl. Genet. Mol. Biol. 2010.
 */
export function addOnePValue(exceedances: number, draws: number): number {
  const isWhole = Number.isInteger(exceedances) && Number.isInteger(draws);
  if (!isWhole || draws < 1 || exceedances < 0 || exceedances > draws) {
    throw new EngineError('invalidOption', `${exceedances} of ${draws} is not a count of permutation draws`);
  }
  return (exceedances + 1) / (draws + 1);
}
