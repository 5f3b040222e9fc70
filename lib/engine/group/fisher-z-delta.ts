import { EngineError } from '@/lib/engine/engine-error';

/** A transformed estimate with the squared standard error that the delta method gives it. */
export interface TransformedEstimate {
  estimate: number;
  variance: number;
}

/**
 * Fisher's z of a correlation with its variance by the delta method.
 *
 * z = artanh r, var z = se(r)²/(1 − r²)².
 * Shapes: r in [−1, 1], se ≥ 0. Mutates nothing. Returns null for |r| = 1, where z has no value.
 * Throws EngineError outside these ranges. Cost: constant. Source: Fisher, Metron 1921; delta method.
 */
export function fisherZDelta(r: number, standardError: number): TransformedEstimate | null {
  if (!(r >= -1 && r <= 1) || !(standardError >= 0) || !Number.isFinite(standardError)) {
    throw new EngineError('invalidOption', `r = ${r} with standard error ${standardError} is no correlation`);
  }
  if (Math.abs(r) === 1) return null;
  const estimate = Math.atanh(r);
  const variance = (standardError / (1 - r * r)) ** 2;
  return Number.isFinite(variance) ? { estimate, variance } : null;
}
