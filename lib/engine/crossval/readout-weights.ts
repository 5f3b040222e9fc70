import type { EvaluatedLabels } from '@/lib/engine/crossval/evaluate-labels';
import type { FoldFit } from '@/lib/engine/crossval/fold-fit';
import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * A readout's weights on the scaled features that were kept (one a kept feature), for label row `row`:
 * primal and svd Vα, dual ZᵀUα. In label units per standard deviation; divide by `fit.sd` for label units per feature unit.
 *
 * Needs a fit whose setup asked for `keepsScaled`. Nothing passed in is changed. Cost O(p·r) or O(n·p).
 */
export function readoutWeights(
  fit: FoldFit,
  evaluated: EvaluatedLabels,
  row: number,
  linalg: Linalg,
): Float64Array {
  const { factor } = fit;
  const p = fit.kept.length;
  const weights = new Float64Array(p);
  if (p === 0) return weights;
  const alpha = evaluated.alpha.subarray(row * factor.r, (row + 1) * factor.r);
  if (factor.directions !== null) {
    linalg.gemm('none', 'none', 1, p, factor.r, 1, alpha, factor.r, factor.directions, p, 0, weights, p);
    return weights;
  }
  const z = fit.scaledTrain;
  if (z === undefined) throw new RangeError('weights of a dual fit need its scaled training features');
  const { nTrain, r, left } = factor;
  const trialWeights = new Float64Array(nTrain);
  linalg.gemm('none', 'none', nTrain, 1, r, 1, left, r, alpha, 1, 0, trialWeights, 1);
  linalg.gemm('none', 'none', 1, p, nTrain, 1, trialWeights, nTrain, z, p, 0, weights, p);
  return weights;
}
