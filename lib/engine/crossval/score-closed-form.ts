import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * Closed-form scores of every candidate for m labels: score(row, l) = Σᵢ (weights[l][i]·(residual − left·(fit_l∘c))ᵢ)².
 *
 * `residual` m × nTrain, `c` m × r (residual·left), left alone. Returns m × candidates; Infinity where a score does not
 * exist. Cost 2·m·nTrain·r a candidate.
 */
export function scoreClosedForm(
  factor: SpectralFactor,
  candidates: Candidate[],
  weights: (Float64Array | null)[],
  residual: Float64Array,
  c: Float64Array,
  m: number,
  linalg: Linalg,
): Float64Array {
  const { nTrain, r, left } = factor;
  const count = candidates.length;
  const scores = new Float64Array(m * count).fill(Infinity);
  const scaled = new Float64Array(m * r);
  const error = new Float64Array(m * nTrain);
  for (let l = 0; l < count; l++) {
    const weight = weights[l];
    if (weight === null) continue;
    const gain = candidates[l].fit;
    for (let row = 0, at = 0; row < m; row++) for (let j = 0; j < r; j++, at++) scaled[at] = gain[j] * c[at];
    error.set(residual);
    if (r > 0) linalg.gemm('none', 'transpose', m, nTrain, r, -1, scaled, r, left, r, 1, error, nTrain);
    for (let row = 0, at = 0; row < m; row++) {
      let sum = 0;
      for (let i = 0; i < nTrain; i++, at++) {
        const e = error[at] * weight[i];
        sum += e * e;
      }
      scores[row * count + l] = sum;
    }
  }
  return scores;
}
