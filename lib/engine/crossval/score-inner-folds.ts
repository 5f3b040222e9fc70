import type { FactoredFold } from '@/lib/engine/crossval/fold-fit';
import { projectLabels } from '@/lib/engine/crossval/project-labels';
import { readoutCoefficients } from '@/lib/engine/crossval/readout-coefficients';
import type { Linalg } from '@/lib/engine/linalg/port';

/**
 * Squared error of every candidate pooled over inner folds, for m labels. `yTrain` m × nTrain over the outer training
 * trials; inner folds index its columns. Returns m × candidates. Cost: a projection and 2·m·nTest·r a candidate and fold.
 */
export function scoreInnerFolds(
  folds: { train: Int32Array; test: Int32Array; fit: FactoredFold }[],
  count: number,
  yTrain: Float64Array,
  nTrain: number,
  m: number,
  linalg: Linalg,
): Float64Array {
  const scores = new Float64Array(m * count);
  for (const { train, test, fit } of folds) {
    const y = new Float64Array(m * train.length);
    for (let row = 0; row < m; row++) {
      for (let i = 0; i < train.length; i++) y[row * train.length + i] = yTrain[row * nTrain + train[i]];
    }
    const { c, basePredicted } = projectLabels(fit, y, m, linalg);
    const { r, nTest } = fit.factor;
    const write = readoutCoefficients(fit, c, m);
    const alpha = new Float64Array(m * r);
    const error = new Float64Array(m * nTest);
    for (let l = 0; l < count; l++) {
      for (let row = 0; row < m; row++) write(l, row, alpha, row * r);
      error.set(basePredicted);
      if (r > 0)
        linalg.gemm('none', 'transpose', m, nTest, r, 1, alpha, r, fit.factor.test, r, 1, error, nTest);
      for (let row = 0; row < m; row++) {
        let sum = 0;
        for (let i = 0; i < nTest; i++) {
          const e = yTrain[row * nTrain + test[i]] - error[row * nTest + i];
          sum += e * e;
        }
        scores[row * count + l] += sum;
      }
    }
  }
  return scores;
}
