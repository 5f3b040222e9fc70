import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * One factorisation of a training fold's scaled features Z (nTrain × p) that serves every label and every penalty.
 *
 * With c = leftᵀ·y, a linear readout is a vector α of r numbers: fitted values left·(fitWeight∘α), held-out
 * predictions test·α. For ridge α = c/(w + λ).
 * - primal (p < n): ZᵀZ = V·diag(w)·Vᵀ, left = Z·V, test = Z_test·V, fitWeight 1.
 * - dual (p ≥ n): ZZᵀ = U·diag(w)·Uᵀ, left = U, test = Z_test·Zᵀ·U, fitWeight w.
 * - svd: Z = U·diag(s)·Vᵀ, left = U, test = Z_test·V, w = s², fitWeight s; α of ridge is s·c/(w + λ).
 */
export interface SpectralFactor {
  kind: 'primal' | 'dual' | 'svd';
  nTrain: number;
  nTest: number;
  r: number;
  left: Float64Array;
  test: Float64Array;
  w: Float64Array;
  /** primal and svd: r × p, directions as rows. dual: left out (weights go through Zᵀ). */
  directions: Float64Array | null;
}

/** λ/s₁² below which the Gram matrix has lost too many digits and the SVD is used (measured on NIST's Longley and Filip). */
export const SMALLEST_RELATIVE_PENALTY = 1e-7;

/**
 * Factorises a training fold. `smallestPenalty` > 0: an eigen-decomposition of the smaller Gram matrix, or the SVD where
 * that penalty is tiny beside the largest eigenvalue; 0: the SVD at once (least squares, components).
 *
 * `zTrain` nTrain × p, `zTest` nTest × p, centred; left alone. Cost: n·p·r for the Gram matrix and about 9·r³,
 * r = min(nTrain, p); the SVD about 14·n·p·r flops.
 * Source of the dual form: Hastie & Tibshirani, Biostatistics 2004.
 */
export function spectralFactor(
  zTrain: Float64Array,
  nTrain: number,
  zTest: Float64Array,
  nTest: number,
  p: number,
  smallestPenalty: number,
  linalg: Linalg,
): SpectralFactor {
  const empty = new Float64Array(0);
  if (p === 0) {
    return { kind: 'primal', nTrain, nTest, r: 0, left: empty, test: empty, w: empty, directions: empty };
  }
  if (smallestPenalty > 0) {
    const isPrimal = p < nTrain;
    const order = isPrimal ? p : nTrain;
    const gram = linalg.gram(isPrimal ? 'columns' : 'rows', nTrain, p, zTrain);
    const { values: w, vectors } = linalg.symmetricEigen(order, gram);
    for (let j = 0; j < order; j++) if (w[j] < 0) w[j] = 0;
    if (smallestPenalty >= SMALLEST_RELATIVE_PENALTY * w[order - 1]) {
      return isPrimal
        ? primal(zTrain, nTrain, zTest, nTest, p, w, vectors, linalg)
        : dual(zTrain, nTrain, zTest, nTest, p, w, vectors, linalg);
    }
  }
  const r = Math.min(nTrain, p);
  const { u, s, vt } = linalg.thinSvd(nTrain, p, zTrain.slice());
  const test = new Float64Array(nTest * r);
  linalg.gemm('none', 'transpose', nTest, r, p, 1, zTest, p, vt, p, 0, test, r);
  return { kind: 'svd', nTrain, nTest, r, left: u, test, w: s.map((x) => x * x), directions: vt };
}

function primal(
  zTrain: Float64Array,
  nTrain: number,
  zTest: Float64Array,
  nTest: number,
  p: number,
  w: Float64Array,
  vectors: Float64Array,
  linalg: Linalg,
): SpectralFactor {
  const left = new Float64Array(nTrain * p);
  const test = new Float64Array(nTest * p);
  linalg.gemm('none', 'transpose', nTrain, p, p, 1, zTrain, p, vectors, p, 0, left, p);
  linalg.gemm('none', 'transpose', nTest, p, p, 1, zTest, p, vectors, p, 0, test, p);
  return { kind: 'primal', nTrain, nTest, r: p, left, test, w, directions: vectors };
}

function dual(
  zTrain: Float64Array,
  nTrain: number,
  zTest: Float64Array,
  nTest: number,
  p: number,
  w: Float64Array,
  vectors: Float64Array,
  linalg: Linalg,
): SpectralFactor {
  const cross = new Float64Array(nTest * nTrain);
  linalg.gemm('none', 'transpose', nTest, nTrain, p, 1, zTest, p, zTrain, p, 0, cross, nTrain);
  return dualFactor(w, vectors, cross, nTrain, nTest, linalg);
}

/**
 * The dual form from the eigen-decomposition of ZZᵀ (values `w` ≥ 0, vectors as rows) and Z_test·Zᵀ (`cross`,
 * nTest × nTrain). Nothing passed in is changed. Cost 2·nTest·nTrain² flops.
 */
export function dualFactor(
  w: Float64Array,
  vectors: Float64Array,
  cross: Float64Array,
  nTrain: number,
  nTest: number,
  linalg: Linalg,
): SpectralFactor {
  const r = nTrain;
  const left = new Float64Array(nTrain * r);
  for (let j = 0; j < r; j++) for (let i = 0; i < nTrain; i++) left[i * r + j] = vectors[j * nTrain + i];
  const test = new Float64Array(nTest * r);
  linalg.gemm('none', 'none', nTest, r, nTrain, 1, cross, nTrain, left, r, 0, test, r);
  return { kind: 'dual', nTrain, nTest, r, left, test, w, directions: null };
}
