import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { Linalg } from '@/lib/engine/linalg/port';

/** Most rows (labels × candidates) that are worked out in one product. */
const MOST_STACKED = 256;

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
  // One or a few labels: all candidates in one product, so that `left` is read once and not once a candidate.
  if (count > 1 && m * count <= MOST_STACKED) {
    return scoreStacked(factor, candidates, weights, residual, c, m, linalg);
  }
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

/** The same for few labels: rows are label × candidate. */
function scoreStacked(
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
  const scaled = new Float64Array(m * count * r);
  const error = new Float64Array(m * count * nTrain);
  for (let row = 0; row < m; row++) {
    for (let l = 0; l < count; l++) {
      const at = row * count + l;
      const gain = candidates[l].fit;
      for (let j = 0; j < r; j++) scaled[at * r + j] = gain[j] * c[row * r + j];
      error.set(residual.subarray(row * nTrain, (row + 1) * nTrain), at * nTrain);
    }
  }
  const rows = m * count;
  if (r > 0) linalg.gemm('none', 'transpose', rows, nTrain, r, -1, scaled, r, left, r, 1, error, nTrain);
  return Float64Array.from({ length: rows }, (_, at) => {
    const weight = weights[at % count];
    if (weight === null) return Infinity;
    let sum = 0;
    for (let i = 0; i < nTrain; i++) {
      const e = error[at * nTrain + i] * weight[i];
      sum += e * e;
    }
    return sum;
  });
}
