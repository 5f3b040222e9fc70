import type { FactoredFold } from '@/lib/engine/crossval/fold-fit';
import type { Linalg } from '@/lib/engine/linalg/port';

/** Labels as a factor sees them. m labels as rows. */
export interface ProjectedLabels {
  m: number;
  /** m × nTrain: labels without their unpenalised part. */
  residual: Float64Array;
  /** m × r: residual·left. */
  c: Float64Array;
  /** m × nTest: what intercept and nuisance alone predict. */
  basePredicted: Float64Array;
  /** m: mean training label. */
  trainMean: Float64Array;
}

/**
 * Takes intercept and nuisance out of m labels (rows of `yTrain`, m × nTrain, left alone) and projects them onto a
 * factor. Cost 2·m·nTrain·(r + 2·rank of the nuisance).
 */
export function projectLabels(
  fold: FactoredFold,
  yTrain: Float64Array,
  m: number,
  linalg: Linalg,
): ProjectedLabels {
  const { factor, base } = fold;
  const { nTrain, nTest, r } = factor;
  const residual = yTrain.slice(0, m * nTrain);
  const trainMean = new Float64Array(m);
  for (let row = 0; row < m; row++) {
    let sum = 0;
    for (let i = row * nTrain; i < (row + 1) * nTrain; i++) sum += yTrain[i];
    trainMean[row] = sum / nTrain;
  }
  const basePredicted = new Float64Array(m * nTest);
  if (base === null) {
    for (let row = 0; row < m; row++) {
      const mean = trainMean[row];
      for (let i = row * nTrain; i < (row + 1) * nTrain; i++) residual[i] -= mean;
      basePredicted.fill(mean, row * nTest, (row + 1) * nTest);
    }
  } else {
    const { rank, q, apply } = base;
    const k = new Float64Array(m * rank);
    linalg.gemm('none', 'none', m, rank, nTrain, 1, yTrain, nTrain, q, rank, 0, k, rank);
    linalg.gemm('none', 'transpose', m, nTrain, rank, -1, k, rank, q, rank, 1, residual, nTrain);
    linalg.gemm('none', 'transpose', m, nTest, rank, 1, k, rank, apply, rank, 0, basePredicted, nTest);
  }
  const c = new Float64Array(m * r);
  if (r > 0) linalg.gemm('none', 'none', m, r, nTrain, 1, residual, nTrain, factor.left, r, 0, c, r);
  return { m, residual, c, basePredicted, trainMean };
}
