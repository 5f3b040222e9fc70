import type { Candidate } from '@/lib/engine/estimators/candidates';
import type { SpectralFactor } from '@/lib/engine/estimators/spectral-factor';
import type { UnpenalisedBase } from '@/lib/engine/estimators/unpenalised-base';
import type { Linalg } from '@/lib/engine/linalg/port';

/** Below this, 1 − hᵢ is rounding noise: the trial determines its own fit and its leave-one-out error does not exist. */
const SMALLEST_FREEDOM = 1e-9;

/**
 * Weights that turn training residuals into a closed-form score of each candidate, score_l = Σᵢ (weightₗᵢ·eᵢ)².
 *
 * With h the leverage of the linear fit, intercept and nuisance included, hᵢ = Σ_j qᵢⱼ² + Σ_j leftᵢⱼ²·fit_j:
 * - leaveOneOut: weight 1/(1 − hᵢ). Exact: for fixed scaling eᵢ/(1 − hᵢ) is the error of the fit without trial i.
 * - gcv: the same weight for all, √n/(n − Σhᵢ), so that the score is n·RSS/(n − tr H)².
 *
 * Returns one row of nTrain weights a candidate, null where a trial has no freedom left (hᵢ = 1).
 * Cost 2·nTrain·r a candidate. Source: Allen, Technometrics 1974 (PRESS); Golub, Heath & Wahba, Technometrics 1979.
 */
export function closedFormWeights(
  factor: SpectralFactor,
  base: UnpenalisedBase | null,
  candidates: Candidate[],
  choice: 'leaveOneOut' | 'gcv',
  linalg: Linalg,
): (Float64Array | null)[] {
  const { nTrain: n, r, left } = factor;
  const squares = left.map((x) => x * x);
  const gains = new Float64Array(candidates.length * r);
  candidates.forEach((candidate, l) => gains.set(candidate.fit, l * r));
  const leverage = new Float64Array(candidates.length * n);
  linalg.gemm('none', 'transpose', candidates.length, n, r, 1, gains, r, squares, r, 0, leverage, n);
  const fixed = new Float64Array(n).fill(1 / n);
  if (base !== null) {
    for (let i = 0; i < n; i++) {
      fixed[i] = 0;
      for (let j = 0; j < base.rank; j++) fixed[i] += base.q[i * base.rank + j] ** 2;
    }
  }
  return candidates.map((_, l) => {
    const freedom = fixed.map((h, i) => 1 - h - leverage[l * n + i]);
    if (choice === 'gcv') {
      const total = freedom.reduce((sum, x) => sum + x, 0);
      return total > SMALLEST_FREEDOM * n ? new Float64Array(n).fill(Math.sqrt(n) / total) : null;
    }
    return freedom.every((x) => x > SMALLEST_FREEDOM) ? freedom.map((x) => 1 / x) : null;
  });
}
