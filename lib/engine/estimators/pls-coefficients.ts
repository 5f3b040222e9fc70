import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';

/**
 * Partial least squares for one target, for many labels through one factorisation.
 *
 * The fit with k components is the least-squares fit within the Krylov space span{Kȳ, K²ȳ, … K^k ȳ}, K = ZZᵀ
 * (Helland 1988; the same as k steps of Lanczos on K). In a factor's coordinates K is diagonal, so that each label costs O(r·k²)
 * beside its projection: α₁ ∝ start, α_{i+1} = w∘α_i, orthogonalised twice against all earlier ones in the scores' inner product.
 * Nothing is divided by a singular value.
 *
 * `c`: m × r, rows leftᵀ·y of centred labels. Returns m × (kMax + 1) × r: the α of 0, 1 … kMax components, to be used as
 * test·α (see SpectralFactor). Components beyond the label's Krylov rank add nothing. Only primal and dual factors.
 * Source: Helland, Commun. Stat. Simul. 1988; Eldén, Comput. Stat. Data Anal. 2004.
 */
export function plsCoefficients(
  factor: SpectralFactor,
  c: Float64Array,
  m: number,
  kMax: number,
): Float64Array {
  const { r, w, kind } = factor;
  const out = new Float64Array(m * (kMax + 1) * r);
  const isDual = kind === 'dual';
  const vectors = Array.from({ length: kMax }, () => new Float64Array(r));
  // Inner product of scores: sᵀs of primal α is αᵀ·w·α, of dual α it is αᵀ·w²·α.
  const metric = isDual ? w.map((x) => x * x) : w;
  for (let row = 0; row < m; row++) {
    const y = c.subarray(row * r, (row + 1) * r);
    const start = out.subarray(row * (kMax + 1) * r, (row + 1) * (kMax + 1) * r);
    let previous: Float64Array = y;
    let scale = 0;
    for (let k = 1; k <= kMax; k++) {
      const now = start.subarray(k * r, (k + 1) * r);
      now.set(start.subarray((k - 1) * r, k * r));
      const v = vectors[k - 1];
      for (let j = 0; j < r; j++) v[j] = k === 1 ? previous[j] : w[j] * previous[j];
      const before = Math.sqrt(inner(v, v, metric));
      for (let pass = 0; pass < 2; pass++) {
        for (let i = 0; i < k - 1; i++) {
          const h = inner(vectors[i], v, metric);
          for (let j = 0; j < r; j++) v[j] -= h * vectors[i][j];
        }
      }
      const norm = Math.sqrt(inner(v, v, metric));
      if (k === 1) scale = norm;
      if (!(norm > before * 1e-10) || scale === 0) {
        // The Krylov space is exhausted: more components repeat this fit.
        for (let l = k; l <= kMax; l++) start.copyWithin(l * r, (k - 1) * r, k * r);
        break;
      }
      let along = 0;
      for (let j = 0; j < r; j++) {
        v[j] /= norm;
        along += (isDual ? w[j] * v[j] : v[j]) * y[j];
      }
      for (let j = 0; j < r; j++) now[j] += along * v[j];
      previous = v;
    }
  }
  return out;
}

function inner(a: Float64Array, b: Float64Array, metric: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < a.length; j++) sum += a[j] * metric[j] * b[j];
  return sum;
}
