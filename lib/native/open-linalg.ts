import koffi, { type LibraryHandle } from 'koffi';
import { checkMatrix } from '@/lib/engine/linalg/check-matrix';
import type { Linalg, SymmetricEigen, ThinSvd, Transpose } from '@/lib/engine/linalg/port';

const ROW_MAJOR = 101;
const TRANSPOSE = { none: 111, transpose: 112 } as const;
const UPPER = 121;
const LIBRARIES = ['libopenblas.so.0', 'libopenblas.so'];

/** A letter as Fortran's CHARACTER(1). */
const letter = (text: string): Uint8Array => Uint8Array.of(text.charCodeAt(0));

function load(): LibraryHandle | null {
  for (const name of LIBRARIES) {
    try {
      return koffi.load(name);
    } catch {
      // not installed under this name: try the next one
    }
  }
  return null;
}

function need(isRightType: boolean, what: string): void {
  if (!isRightType) throw new TypeError(`${what} is not of the array type that this call takes`);
}

function open(library: LibraryHandle): Linalg {
  // Two BLAS threads under load are far slower than one; the work is parallel over chunks instead.
  library.func('void openblas_set_num_threads(int)')(1);
  const core = String(library.func('const char *openblas_get_corename()')());
  const config = String(library.func('const char *openblas_get_config()')()).trim();
  const dgemm = library.func(
    'void cblas_dgemm(int, int, int, int, int, int, double, double *a, int, double *b, int, double, double *c, int)',
  );
  const sgemm = library.func(
    'void cblas_sgemm(int, int, int, int, int, int, float, float *a, int, float *b, int, float, float *c, int)',
  );
  const dsyrk = library.func(
    'void cblas_dsyrk(int, int, int, int, int, double, double *a, int, double, double *c, int)',
  );
  // LAPACK's Fortran entries: every argument by address; the trailing sizes are the hidden lengths of the characters.
  const dsyevd = library.func(
    'void dsyevd_(uint8_t *jobz, uint8_t *uplo, int *n, double *a, int *lda, double *w, double *work, int *lwork, int *iwork, int *liwork, int *info, size_t, size_t)',
  );
  const dgesdd = library.func(
    'void dgesdd_(uint8_t *jobz, int *m, int *n, double *a, int *lda, double *s, double *u, int *ldu, double *vt, int *ldvt, double *work, int *lwork, int *iwork, int *info, size_t)',
  );

  function gemm(
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
  ): void {
    need(a instanceof Float64Array && b instanceof Float64Array && c instanceof Float64Array, 'gemm operand');
    checkMatrix('A', a, transA === 'none' ? m : k, transA === 'none' ? k : m, lda);
    checkMatrix('B', b, transB === 'none' ? k : n, transB === 'none' ? n : k, ldb);
    checkMatrix('C', c, m, n, ldc);
    if (m === 0 || n === 0) return;
    dgemm(
      ROW_MAJOR,
      TRANSPOSE[transA],
      TRANSPOSE[transB],
      m,
      n,
      k,
      alpha,
      a,
      Math.max(lda, 1),
      b,
      Math.max(ldb, 1),
      beta,
      c,
      ldc,
    );
  }

  function gemm32(
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
  ): void {
    need(
      a instanceof Float32Array && b instanceof Float32Array && c instanceof Float32Array,
      'gemm32 operand',
    );
    checkMatrix('A', a, transA === 'none' ? m : k, transA === 'none' ? k : m, lda);
    checkMatrix('B', b, transB === 'none' ? k : n, transB === 'none' ? n : k, ldb);
    checkMatrix('C', c, m, n, ldc);
    if (m === 0 || n === 0) return;
    sgemm(
      ROW_MAJOR,
      TRANSPOSE[transA],
      TRANSPOSE[transB],
      m,
      n,
      k,
      alpha,
      a,
      Math.max(lda, 1),
      b,
      Math.max(ldb, 1),
      beta,
      c,
      ldc,
    );
  }

  function gram(
    of: 'columns' | 'rows',
    rows: number,
    cols: number,
    a: Float64Array,
    into?: Float64Array,
  ): Float64Array {
    need(a instanceof Float64Array, 'gram operand');
    checkMatrix('A', a, rows, cols, cols);
    const order = of === 'columns' ? cols : rows;
    const depth = of === 'columns' ? rows : cols;
    const out = into ?? new Float64Array(order * order);
    need(out instanceof Float64Array, 'gram result');
    checkMatrix('G', out, order, order, order);
    if (order === 0 || depth === 0) return out;
    const trans = TRANSPOSE[of === 'columns' ? 'transpose' : 'none'];
    dsyrk(ROW_MAJOR, UPPER, trans, order, depth, 1, a, cols, into === undefined ? 0 : 1, out, order);
    for (let i = 0; i < order; i++) for (let j = 0; j < i; j++) out[i * order + j] = out[j * order + i];
    return out;
  }

  /** Work space of the eigensolver, 2·n² numbers, kept: asking for it anew each time would leave as much to collect. */
  let eigenWork = new Float64Array(0);

  function symmetricEigen(n: number, a: Float64Array): SymmetricEigen {
    need(a instanceof Float64Array, 'symmetricEigen operand');
    checkMatrix('A', a, n, n, n);
    const values = new Float64Array(n);
    if (n === 0) return { values, vectors: new Float64Array(0) };
    const size = Int32Array.of(n);
    const lwork = 1 + 6 * n + 2 * n * n;
    const liwork = 3 + 5 * n;
    if (eigenWork.length < lwork) eigenWork = new Float64Array(lwork);
    const info = new Int32Array(1);
    // The row-major matrix read by columns is its own transpose; eigenvectors come out as columns, which are our rows.
    dsyevd(
      letter('V'), letter('L'), size, a, size, values,
      eigenWork, Int32Array.of(lwork), new Int32Array(liwork), Int32Array.of(liwork), info, 1, 1,
    ); // prettier-ignore
    if (info[0] !== 0)
      throw new RangeError(`symmetric eigenproblem of order ${n} did not converge (${info[0]})`);
    return { values, vectors: a.length === n * n ? a : a.subarray(0, n * n) };
  }

  function thinSvd(m: number, n: number, a: Float64Array): ThinSvd {
    need(a instanceof Float64Array, 'thinSvd operand');
    checkMatrix('A', a, m, n, n);
    const k = Math.min(m, n);
    const u = new Float64Array(m * k);
    const s = new Float64Array(k);
    const vt = new Float64Array(k * n);
    if (k === 0) return { u, s, vt };
    // Read by columns the array is Aᵀ = V·S·Uᵀ, n × m: its left vectors are our vt, its right ones our u.
    const call = (work: Float64Array, lwork: number): void => {
      const info = new Int32Array(1);
      dgesdd(
        letter('S'), Int32Array.of(n), Int32Array.of(m), a, Int32Array.of(n), s, vt, Int32Array.of(n), u,
        Int32Array.of(k), work, Int32Array.of(lwork), new Int32Array(8 * k), info, 1,
      ); // prettier-ignore
      if (info[0] !== 0) throw new RangeError(`SVD of a ${m} × ${n} matrix did not converge (${info[0]})`);
    };
    const asked = new Float64Array(1);
    call(asked, -1);
    const lwork = Math.ceil(asked[0]);
    call(new Float64Array(lwork), lwork);
    return { u, s, vt };
  }

  return {
    name: 'openblas',
    description: `${config} (core ${core})`,
    gemm,
    gemm32,
    gram,
    symmetricEigen,
    thinSvd,
  };
}

/**
 * OpenBLAS with its LAPACK behind the engine's port, through koffi, at one thread; null where the library is missing.
 * Every call is guarded by type and length checks, since koffi takes wrong types silently.
 * Call once a thread and keep the result.
 */
export function openNativeLinalg(): Linalg | null {
  const library = load();
  return library === null ? null : open(library);
}
