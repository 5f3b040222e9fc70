import type { ScreenPlan } from '@/lib/engine/crossval/screen-plan';
import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { Linalg } from '@/lib/engine/linalg/port';

/** Half a unit in the last place of single precision. */
const ROUNDING = 2 ** -24;
/** Multiple of the rounding model's standard deviation. */
const SAFETY = 6;

/** Numbers of one tile of residuals, so that it stays in a core's second-level cache. */
const TILE_NUMBERS = 160_000;

/**
 * Which candidates can still be the best one of each of m labels, after scores in single precision.
 *
 * The screened root score of a candidate is off by at most its slack, so that it is out when its root score less its slack
 * is above another's plus that one's. At least one candidate stays; mostly it is the only one. The slack is the largest
 * weight times the sum of what combining loses for this label, known exactly, and rounding: a sum of k terms errs by
 * √k·2⁻²⁴ of their size (the probabilistic model of Higham & Mary, SIAM J. Sci. Comput. 2019), times a safety factor.
 *
 * `residual` m × nTrain (labels without intercept and nuisance), `c` m × r; left alone. Returns m × candidates flags.
 * Cost in single precision: 2·m·nTrain·r a picked candidate and 2·m·nTrain·(picked + 1) a candidate.
 */
export function screenPenalties(
  screen: ScreenPlan,
  factor: SpectralFactor,
  candidates: Candidate[],
  residual: Float64Array,
  c: Float64Array,
  m: number,
  linalg: Linalg,
): Uint8Array {
  const { nTrain: n, r } = factor;
  const { picked, combine, left, weights } = screen;
  const count = candidates.length;
  const nPicked = picked.length;
  const basis = new Float32Array((nPicked + 1) * m * n);
  const scaled = new Float32Array(m * r);
  picked.forEach((l, q) => {
    const gain = candidates[l].fit;
    for (let row = 0, at = 0; row < m; row++) for (let j = 0; j < r; j++, at++) scaled[at] = gain[j] * c[at];
    linalg.gemm32(
      'none',
      'transpose',
      m,
      n,
      r,
      1,
      scaled,
      r,
      left,
      r,
      0,
      basis.subarray(q * m * n, (q + 1) * m * n),
      n,
    );
  });
  basis.set(residual.subarray(0, m * n), nPicked * m * n);
  const open = new Uint8Array(m * count);
  const size = Math.max(1, Math.min(m, Math.floor(TILE_NUMBERS / (count * n))));
  const error = new Float32Array(count * size * n);
  const roots = new Float64Array(count);
  const width = m * n;
  const slack = slackOf(screen, residual, c, m, n, r, linalg);
  for (let from = 0; from < m; from += size) {
    const rows = Math.min(size, m - from);
    linalg.gemm32(
      'none',
      'none',
      count,
      rows * n,
      nPicked + 1,
      1,
      combine,
      nPicked + 1,
      basis.subarray(from * n),
      width,
      0,
      error,
      rows * n,
    );
    for (let row = 0; row < rows; row++) {
      let bar = Infinity;
      for (let l = 0; l < count; l++) {
        const root = Math.sqrt(weightedSquares(error, l * rows * n + row * n, weights, l * n, n));
        roots[l] = root;
        bar = Math.min(bar, root + slack[(from + row) * count + l]);
      }
      for (let l = 0; l < count; l++)
        if (roots[l] - slack[(from + row) * count + l] <= bar) open[(from + row) * count + l] = 1;
    }
  }
  return open;
}

/** Bound on the error of each screened root score: m × candidates. */
function slackOf(
  screen: ScreenPlan,
  residual: Float64Array,
  c: Float64Array,
  m: number,
  n: number,
  r: number,
  linalg: Linalg,
): Float64Array {
  const { picked, combine, squaredSizes, largestWeight } = screen;
  const nPicked = picked.length;
  const count = largestWeight.length;
  const squares = new Float32Array(m * r);
  for (let i = 0; i < squares.length; i++) squares[i] = c[i] * c[i];
  const total = count + nPicked;
  const sizes = new Float32Array(m * total);
  linalg.gemm32('none', 'transpose', m, total, r, 1, squares, r, squaredSizes, r, 0, sizes, total);
  const slack = new Float64Array(m * count);
  const ofProduct = SAFETY * Math.sqrt(r) * ROUNDING;
  const ofSum = SAFETY * Math.sqrt(nPicked + 1) * ROUNDING;
  for (let row = 0; row < m; row++) {
    let norm = 0;
    for (let i = row * n; i < (row + 1) * n; i++) norm += residual[i] * residual[i];
    norm = Math.sqrt(norm);
    for (let l = 0; l < count; l++) {
      let fits = 0;
      for (let q = 0; q < nPicked; q++) {
        fits += Math.abs(combine[l * (nPicked + 1) + q]) * Math.sqrt(sizes[row * total + count + q]);
      }
      const lost = Math.sqrt(sizes[row * total + l]);
      slack[row * count + l] = largestWeight[l] * (1.001 * lost + (ofProduct + ofSum) * fits + ofSum * norm);
    }
  }
  return slack;
}

/** Σ (a_i·b_i)² over n entries, in four sums that the processor can work on side by side. */
function weightedSquares(a: Float32Array, atA: number, b: Float32Array, atB: number, n: number): number {
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  let i = 0;
  for (; i + 3 < n; i += 4) {
    const x0 = a[atA + i] * b[atB + i];
    const x1 = a[atA + i + 1] * b[atB + i + 1];
    const x2 = a[atA + i + 2] * b[atB + i + 2];
    const x3 = a[atA + i + 3] * b[atB + i + 3];
    s0 += x0 * x0;
    s1 += x1 * x1;
    s2 += x2 * x2;
    s3 += x3 * x3;
  }
  for (; i < n; i++) {
    const x = a[atA + i] * b[atB + i];
    s0 += x * x;
  }
  return s0 + s1 + (s2 + s3);
}
