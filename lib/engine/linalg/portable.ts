import { EigenvalueDecomposition, Matrix, SingularValueDecomposition } from 'ml-matrix';
import { checkMatrix } from '@/lib/engine/linalg/check-matrix';
import type { Linalg, SymmetricEigen, ThinSvd, Transpose } from '@/lib/engine/linalg/port';
import { portableGemm } from '@/lib/engine/linalg/portable-gemm';

function toMatrix(rows: number, cols: number, a: Float64Array): Matrix {
  const matrix = new Matrix(rows, cols);
  for (let i = 0; i < rows; i++) for (let j = 0; j < cols; j++) matrix.set(i, j, a[i * cols + j]);
  return matrix;
}

function gemm(
  transA: Transpose,
  transB: Transpose,
  m: number,
  n: number,
  k: number,
  alpha: number,
  a: Float64Array | Float32Array,
  lda: number,
  b: Float64Array | Float32Array,
  ldb: number,
  beta: number,
  c: Float64Array | Float32Array,
  ldc: number,
): void {
  checkMatrix('A', a, transA === 'none' ? m : k, transA === 'none' ? k : m, lda);
  checkMatrix('B', b, transB === 'none' ? k : n, transB === 'none' ? n : k, ldb);
  checkMatrix('C', c, m, n, ldc);
  portableGemm(transA, transB, m, n, k, alpha, a, lda, b, ldb, beta, c, ldc);
}

function gram(
  of: 'columns' | 'rows',
  rows: number,
  cols: number,
  a: Float64Array,
  into?: Float64Array,
): Float64Array {
  const order = of === 'columns' ? cols : rows;
  const out = into ?? new Float64Array(order * order);
  const beta = into === undefined ? 0 : 1;
  if (of === 'columns') gemm('transpose', 'none', cols, cols, rows, 1, a, cols, a, cols, beta, out, cols);
  else gemm('none', 'transpose', rows, rows, cols, 1, a, cols, a, cols, beta, out, rows);
  return out;
}

function symmetricEigen(n: number, a: Float64Array): SymmetricEigen {
  checkMatrix('A', a, n, n, n);
  const values = new Float64Array(n);
  const vectors = new Float64Array(n * n);
  if (n === 0) return { values, vectors };
  const found = new EigenvalueDecomposition(toMatrix(n, n, a), { assumeSymmetric: true });
  const order = found.realEigenvalues.map((_, j) => j);
  order.sort((p, q) => found.realEigenvalues[p] - found.realEigenvalues[q]);
  const columns = found.eigenvectorMatrix;
  order.forEach((from, j) => {
    values[j] = found.realEigenvalues[from];
    for (let i = 0; i < n; i++) vectors[j * n + i] = columns.get(i, from);
  });
  return { values, vectors };
}

function thinSvd(m: number, n: number, a: Float64Array): ThinSvd {
  checkMatrix('A', a, m, n, n);
  const k = Math.min(m, n);
  const u = new Float64Array(m * k);
  const s = new Float64Array(k);
  const vt = new Float64Array(k * n);
  if (k === 0) return { u, s, vt };
  const found = new SingularValueDecomposition(toMatrix(m, n, a), { autoTranspose: true });
  const left = found.leftSingularVectors;
  const right = found.rightSingularVectors;
  for (let j = 0; j < k; j++) {
    s[j] = found.diagonal[j];
    for (let i = 0; i < m; i++) u[i * k + j] = left.get(i, j);
    for (let i = 0; i < n; i++) vt[j * n + i] = right.get(i, j);
  }
  return { u, s, vt };
}

/**
 * Linear algebra without native code: typed arrays and ml-matrix (its symmetric eigensolver and SVD follow
 * EISPACK's tred2/tql2 and LINPACK's SVD by way of JAMA). Slow for large problems; the numbers agree with the native
 * backend to 1e-9 and better.
 */
export const portableLinalg: Linalg = {
  name: 'portable',
  description: 'typed arrays and ml-matrix',
  gemm,
  gemm32: gemm,
  gram,
  symmetricEigen,
  thinSvd,
};
