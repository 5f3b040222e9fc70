import type { UnpenalisedBase } from '@/lib/engine/estimators/unpenalised-base';
import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * Takes the unpenalised part out of features, by training trials' coefficients: X ← X − Q(QᵀX_train) on training rows,
 * X ← X − apply·(QᵀX_train) on held-out rows. Both matrices (nTrain × p, nTest × p) are overwritten.
 * A feature that intercept and nuisance explain to 1e-10 of its size becomes exactly zero. Cost O(n·p·rank).
 */
export function residualise(
  xTrain: Float64Array,
  nTrain: number,
  xTest: Float64Array,
  nTest: number,
  p: number,
  base: UnpenalisedBase,
  linalg: Linalg,
): void {
  const { rank, q, apply } = base;
  const sizes = columnSizes(xTrain, nTrain, p);
  const coefficients = new Float64Array(rank * p);
  linalg.gemm('transpose', 'none', rank, p, nTrain, 1, q, rank, xTrain, p, 0, coefficients, p);
  linalg.gemm('none', 'none', nTrain, p, rank, -1, q, rank, coefficients, p, 1, xTrain, p);
  linalg.gemm('none', 'none', nTest, p, rank, -1, apply, rank, coefficients, p, 1, xTest, p);
  const left = columnSizes(xTrain, nTrain, p);
  for (let j = 0; j < p; j++) {
    if (left[j] > 1e-10 * sizes[j]) continue;
    for (let i = 0; i < nTrain; i++) xTrain[i * p + j] = 0;
    for (let i = 0; i < nTest; i++) xTest[i * p + j] = 0;
  }
}

function columnSizes(x: Float64Array, n: number, p: number): Float64Array {
  const sums = new Float64Array(p);
  for (let i = 0; i < n; i++) for (let j = 0; j < p; j++) sums[j] += x[i * p + j] ** 2;
  return sums.map(Math.sqrt);
}
