import { lag1Autocorrelation } from '@/lib/engine/measures/lag1-autocorrelation';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** The effective number of trials and the two autocorrelations that it rests on. */
export interface EffectiveTrials {
  nEffective: number;
  lag1Label: number;
  lag1Residual: number;
}

/**
 * Effective number of trials for a correlation between two autocorrelated sequences.
 *
 * n_eff = n(1 − ρ_y ρ_e)/(1 + ρ_y ρ_e), ρ_y and ρ_e the lag-1 autocorrelations of label and residual (y − ŷ). It is above
 * n where the product is negative; it is not clipped.
 * Shapes: `label`, `residual` n, in the order of the session. Mutates nothing. Returns null where either is constant
 * or n < 3. Throws EngineError on unequal lengths or values that are not finite. Cost: six passes.
 * Source: Bartlett, J. R. Stat. Soc. 1935 (from memory).
 */
export function effectiveTrials(
  label: ArrayLike<number>,
  residual: ArrayLike<number>,
): EffectiveTrials | null {
  const n = label.length;
  requireNumbers('The residual', residual, n);
  if (n < 3) return null;
  const lag1Label = lag1Autocorrelation(label);
  const lag1Residual = lag1Autocorrelation(residual);
  if (lag1Label === null || lag1Residual === null) return null;
  const product = lag1Label * lag1Residual;
  return { nEffective: (n * (1 - product)) / (1 + product), lag1Label, lag1Residual };
}
