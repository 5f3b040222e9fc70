/** Whether a matrix is used as stored or transposed. */
export type Transpose = 'none' | 'transpose';

/** Symmetric eigen-decomposition: `values` ascending (length n), `vectors` n × n row-major with eigenvector j in row j. */
export interface SymmetricEigen {
  values: Float64Array;
  vectors: Float64Array;
}

/** Thin SVD A = U·diag(s)·Vᵀ: `u` m × k, `s` length k descending, `vt` k × n, k = min(m, n), all row-major. */
export interface ThinSvd {
  u: Float64Array;
  s: Float64Array;
  vt: Float64Array;
}

/**
 * The linear algebra that the engine needs. Every matrix is dense and row-major in a typed array;
 * element (i, j) of a rows × cols matrix is a[i·ld + j] with ld ≥ cols.
 *
 * Implementations check lengths once per call and throw `RangeError` when an array is too short;
 * they assume finite entries.
 */
export interface Linalg {
  /** "openblas" or "portable". */
  readonly name: string;
  /** Library version and core type, for the record. */
  readonly description: string;

  /**
   * C ← α·op(A)·op(B) + β·C, with op(A) m × k, op(B) k × n, C m × n.
   * Overwrites C alone. Cost 2·m·n·k flops.
   */
  gemm(
    transA: Transpose,
    transB: Transpose,
    m: number,
    n: number,
    k: number,
    alpha: number,
    a: Float64Array,
    lda: number,
    b: Float64Array,
    ldb: number,
    beta: number,
    c: Float64Array,
    ldc: number,
  ): void;

  /** The same in single precision; only ever used to screen candidates that are then redone in double. */
  gemm32(
    transA: Transpose,
    transB: Transpose,
    m: number,
    n: number,
    k: number,
    alpha: number,
    a: Float32Array,
    lda: number,
    b: Float32Array,
    ldb: number,
    beta: number,
    c: Float32Array,
    ldc: number,
  ): void;

  /**
   * G = AᵀA ('columns', cols × cols) or AAᵀ ('rows', rows × rows) for A rows × cols; both triangles are filled.
   * A is left alone. `into`, where given, is added to and returned; it must be symmetric. Cost about rows·cols·order flops.
   */
  gram(
    of: 'columns' | 'rows',
    rows: number,
    cols: number,
    a: Float64Array,
    into?: Float64Array,
  ): Float64Array;

  /** Eigen-decomposition of the symmetric n × n matrix `a`, which is destroyed. Cost about 9·n³ flops. */
  symmetricEigen(n: number, a: Float64Array): SymmetricEigen;

  /** Thin SVD of the m × n matrix `a`, which is destroyed. Cost about 14·m·n·min(m, n) flops. */
  thinSvd(m: number, n: number, a: Float64Array): ThinSvd;
}
