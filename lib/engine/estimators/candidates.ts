import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';

/** One readout that may be chosen: a penalty or a number of components, as gains on c = leftᵀ·y. */
export interface Candidate {
  penalty: number | null;
  components: number | null;
  /** Fitted values are left·(fit∘c). */
  fit: Float64Array;
  /** Held-out predictions are test·(predict∘c). */
  predict: Float64Array;
}

/**
 * Ridge: the gains of one penalty λ on a factor. λ = 0 on an 'svd' factor is least squares of minimum norm.
 * `freedom`: nTrain less the rank of the unpenalised part; centred features have at most so many directions, whatever
 * rounding leaves in the others.
 */
export function ridgeCandidate(
  factor: SpectralFactor,
  penalty: number,
  p: number,
  freedom: number,
): Candidate {
  const { w, r, kind } = factor;
  const fit = new Float64Array(r);
  const predict = new Float64Array(r);
  // Directions whose singular value is rounding noise carry nothing: min-norm least squares leaves them out.
  const cutoff = r === 0 ? 0 : Math.sqrt(w[0]) * Math.max(factor.nTrain, p) * 2 ** -52;
  for (let j = 0; j < r; j++) {
    if (kind === 'svd') {
      const s = Math.sqrt(w[j]);
      if (!(s > cutoff) || j >= freedom) continue;
      fit[j] = w[j] / (w[j] + penalty);
      predict[j] = s / (w[j] + penalty);
    } else {
      predict[j] = 1 / (w[j] + penalty);
      fit[j] = kind === 'dual' ? w[j] / (w[j] + penalty) : predict[j];
    }
  }
  return { penalty, components: null, fit, predict };
}

/** Principal components: least squares on the first `components` directions of an 'svd' factor. */
export function componentCandidate(
  factor: SpectralFactor,
  components: number,
  p: number,
  freedom: number,
): Candidate {
  const all = ridgeCandidate(factor, 0, p, freedom);
  const used = (x: number, j: number): number => (j < components ? x : 0);
  return { penalty: null, components, fit: all.fit.map(used), predict: all.predict.map(used) };
}
