import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * The unpenalised part of a fit: an intercept and nuisance columns, fitted on training trials.
 * Its prediction of held-out trials is (y·q)·applyᵀ.
 */
export interface UnpenalisedBase {
  rank: number;
  /** nTrain × rank, orthonormal columns that span intercept and nuisance on the training trials. */
  q: Float64Array;
  /** nTest × rank. */
  apply: Float64Array;
}

/**
 * Orthonormal basis of [1, N] on the training trials and the map to held-out trials, by a thin SVD of the scaled design:
 * [1, N]_train·D = U·S·Vᵀ, q = U, apply = [1, N]_test·D·V·S⁻¹, singular values below s₁·max(n, c)·2⁻⁵² dropped (minimum norm).
 *
 * `train` nTrain × cols and `test` nTest × cols hold the nuisance columns without the intercept; they are left alone.
 * Cost O(n·cols²).
 */
export function unpenalisedBase(
  train: Float64Array,
  nTrain: number,
  test: Float64Array,
  nTest: number,
  cols: number,
  linalg: Linalg,
): UnpenalisedBase {
  const width = cols + 1;
  const centre = new Float64Array(cols);
  const scale = new Float64Array(cols);
  for (let j = 0; j < cols; j++) {
    for (let i = 0; i < nTrain; i++) centre[j] += train[i * cols + j] / nTrain;
    for (let i = 0; i < nTrain; i++) scale[j] += (train[i * cols + j] - centre[j]) ** 2 / nTrain;
    scale[j] = Math.sqrt(scale[j]);
    // A column that does not vary on the training trials says nothing: it is left out of this fold's fit.
    if (!(scale[j] > Math.abs(centre[j]) * nTrain * 2 ** -52)) scale[j] = 0;
  }
  const design = (rows: Float64Array, n: number): Float64Array => {
    const out = new Float64Array(n * width);
    for (let i = 0; i < n; i++) {
      out[i * width] = 1;
      for (let j = 0; j < cols; j++) {
        out[i * width + j + 1] = scale[j] === 0 ? 0 : (rows[i * cols + j] - centre[j]) / scale[j];
      }
    }
    return out;
  };
  const { u, s, vt } = linalg.thinSvd(nTrain, width, design(train, nTrain));
  const full = Math.min(nTrain, width);
  const cutoff = s[0] * Math.max(nTrain, width) * 2 ** -52;
  let rank = 0;
  while (rank < full && s[rank] > cutoff) rank++;
  const q = new Float64Array(nTrain * rank);
  for (let i = 0; i < nTrain; i++) for (let j = 0; j < rank; j++) q[i * rank + j] = u[i * full + j];
  const held = design(test, nTest);
  const apply = new Float64Array(nTest * rank);
  for (let i = 0; i < nTest; i++) {
    for (let j = 0; j < rank; j++) {
      let sum = 0;
      for (let l = 0; l < width; l++) sum += held[i * width + l] * vt[j * width + l];
      apply[i * rank + j] = sum / s[j];
    }
  }
  return { rank, q, apply };
}
