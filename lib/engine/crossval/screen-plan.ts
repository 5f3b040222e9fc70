import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';

/** What single-precision screening of penalties needs of one fold. */
export interface ScreenPlan {
  /** Candidates whose fits are worked out; all others are combined from them. */
  picked: number[];
  /** candidates × (picked + 1): row l turns the picked fits and, last, the labels into residuals of candidate l. */
  combine: Float32Array;
  left: Float32Array;
  /** candidates × nTrain. */
  weights: Float32Array;
  /**
   * (candidates + picked) × r: squared sizes, by direction, of what is lost by combining each candidate, then of each
   * picked fit. Times c² they give squared norms for a label.
   */
  squaredSizes: Float32Array;
  /** Largest weight of each candidate. */
  largestWeight: Float64Array;
}

/** Error of the combined fits, relative to ‖label‖, that the picks are made for (found by trying: with fewer picks more labels stay open). */
const COMBINATION_ERROR = 2e-4;
/**
 * Prepares single-precision screening of ridge penalties, or returns null where it would not pay (few candidates) or a
 * candidate has no score.
 *
 * With K_jl = w_j/(w_j + λ_l) a QR decomposition with column pivoting picks q of the L columns that span the others to
 * `COMBINATION_ERROR`; B = R⁻¹QᵀK combines them. What a label loses by it is known exactly: ‖(K − K_picked·B)_l ∘ c‖, since the
 * eigenvectors are orthonormal (see screenPenalties for rounding).
 *
 * Cost O(r·L·q), once a fold. Source of pivoted QR: Businger & Golub, Numer. Math. 1965.
 */
export function screenPlan(
  factor: SpectralFactor,
  candidates: Candidate[],
  weights: (Float64Array | null)[],
): ScreenPlan | null {
  const { r, nTrain, w, kind } = factor;
  const count = candidates.length;
  if (count < 6 || r < 8) return null;
  const rows: Float64Array[] = [];
  for (const weight of weights) {
    if (weight === null) return null;
    rows.push(weight);
  }
  const k = candidates.map(({ fit }) => (kind === 'primal' ? fit.map((g, j) => g * w[j]) : fit));
  const { picked, combine } = pickColumns(k);
  const nPicked = picked.length;
  const residual = new Float32Array(count * (nPicked + 1));
  const squaredSizes = new Float32Array((count + nPicked) * r);
  const largestWeight = Float64Array.from(rows, (row) => row.reduce((most, x) => Math.max(most, x), 0));
  const allWeights = new Float32Array(count * nTrain);
  // c of the primal form carries a singular value, which K already counts: K²c²/w there, K²c² elsewhere.
  const sizeOf = (value: number, j: number): number =>
    kind === 'primal' ? (w[j] > 0 ? (value * value) / w[j] : 0) : value * value;
  for (let l = 0; l < count; l++) {
    for (let j = 0; j < r; j++) {
      let lost = k[l][j];
      for (let q = 0; q < nPicked; q++) lost -= combine[q][l] * k[picked[q]][j];
      squaredSizes[l * r + j] = sizeOf(lost, j);
    }
    for (let q = 0; q < nPicked; q++) residual[l * (nPicked + 1) + q] = -combine[q][l];
    residual[l * (nPicked + 1) + nPicked] = 1;
    allWeights.set(rows[l], l * nTrain);
  }
  for (let q = 0; q < nPicked; q++) {
    for (let j = 0; j < r; j++) squaredSizes[(count + q) * r + j] = sizeOf(k[picked[q]][j], j);
  }
  const left = Float32Array.from(factor.left);
  return { picked, combine: residual, left, weights: allWeights, squaredSizes, largestWeight };
}

/** Columns picked by pivoted Gram–Schmidt, and coefficients of every column on them (picked × columns). */
function pickColumns(columns: Float64Array[]): { picked: number[]; combine: Float64Array[] } {
  const left = columns.map((column) => column.slice());
  const picked: number[] = [];
  /** upper[q][l]: component of column l along the q-th orthonormal direction. */
  const upper: Float64Array[] = [];
  while (picked.length < columns.length) {
    let best = -1;
    let most = 0;
    let worst = 0;
    left.forEach((column, l) => {
      let squares = 0;
      for (const x of column) {
        squares += x * x;
        worst = Math.max(worst, Math.abs(x));
      }
      if (squares > most) {
        most = squares;
        best = l;
      }
    });
    if (best < 0 || worst <= COMBINATION_ERROR) break;
    const norm = Math.sqrt(most);
    const direction = left[best].map((x) => x / norm);
    upper.push(
      Float64Array.from(left, (column) => {
        let along = 0;
        for (let j = 0; j < column.length; j++) along += direction[j] * column[j];
        for (let j = 0; j < column.length; j++) column[j] -= along * direction[j];
        return along;
      }),
    );
    picked.push(best);
    left[best].fill(0);
  }
  const q = picked.length;
  const combine = Array.from({ length: q }, () => new Float64Array(columns.length));
  for (let l = 0; l < columns.length; l++) {
    for (let a = q - 1; a >= 0; a--) {
      let value = upper[a][l];
      for (let b = a + 1; b < q; b++) value -= upper[a][picked[b]] * combine[b][l];
      combine[a][l] = value / upper[a][picked[a]];
    }
  }
  return { picked, combine };
}
