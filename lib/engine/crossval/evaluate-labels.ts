import type { FoldFit } from '@/lib/engine/crossval/fold-fit';
import { pickCandidate } from '@/lib/engine/crossval/pick-candidate';
import { projectLabels } from '@/lib/engine/crossval/project-labels';
import { readoutCoefficients } from '@/lib/engine/crossval/readout-coefficients';
import { scoreOpenCandidates } from '@/lib/engine/crossval/score-open-candidates';
import { scoreClosedForm } from '@/lib/engine/crossval/score-closed-form';
import { screenPenalties } from '@/lib/engine/crossval/screen-penalties';
import { scoreInnerFolds } from '@/lib/engine/crossval/score-inner-folds';
import type { Linalg } from '@/lib/engine/linalg/port';

/** Fewest labels for which screening pays. */
const FEWEST_SCREENED = 16;

/** Held-out predictions of one fold for m labels. */
export interface EvaluatedLabels {
  /** Chosen candidate of each label. */
  choice: Int32Array;
  /** m × nTest, nuisance and intercept included. */
  predicted: Float64Array;
  /** m × nTest: what intercept and nuisance alone predict. */
  basePredicted: Float64Array;
  /** m: mean training label. */
  trainMean: Float64Array;
  /** m × r: coefficients on the factor's directions. */
  alpha: Float64Array;
}

/**
 * Chooses a candidate for each of m labels by its training trials alone and predicts the held-out trials.
 *
 * `yTrain`: m × nTrain, labels as rows over the fold's training trials; left alone. No held-out label is an argument, so
 * that none can leak. Cost 2·m·nTrain·r·(candidates + 1) and the predictions.
 */
export function evaluateLabels(
  fit: FoldFit,
  yTrain: Float64Array,
  m: number,
  linalg: Linalg,
): EvaluatedLabels {
  const { factor, candidates, chooser } = fit;
  const { r, nTest, nTrain } = factor;
  const count = candidates.length;
  const { c, residual, basePredicted, trainMean } = projectLabels(fit, yTrain, m, linalg);
  const choice = new Int32Array(m);
  if (chooser.kind !== 'fixed') {
    const scores =
      chooser.kind === 'closedForm'
        ? closedFormScores(fit, chooser, residual, c, m, linalg)
        : scoreInnerFolds(chooser.folds, count, yTrain, nTrain, m, linalg);
    for (let row = 0; row < m; row++) choice[row] = pickCandidate(scores, row * count, count);
  }
  const write = readoutCoefficients(fit, c, m);
  const alpha = new Float64Array(m * r);
  for (let row = 0; row < m; row++) write(choice[row], row, alpha, row * r);
  const predicted = basePredicted.slice();
  if (r > 0) linalg.gemm('none', 'transpose', m, nTest, r, 1, alpha, r, factor.test, r, 1, predicted, nTest);
  return { choice, predicted, basePredicted, trainMean, alpha };
}

/** Scores of all candidates, or, for many labels, of those that screening in single precision cannot rule out. */
function closedFormScores(
  fit: FoldFit,
  chooser: Extract<FoldFit['chooser'], { kind: 'closedForm' }>,
  residual: Float64Array,
  c: Float64Array,
  m: number,
  linalg: Linalg,
): Float64Array {
  const { factor, candidates } = fit;
  const { weights } = chooser;
  const screen = m >= FEWEST_SCREENED ? chooser.screen() : null;
  if (screen === null) return scoreClosedForm(factor, candidates, weights, residual, c, m, linalg);
  const open = screenPenalties(screen, factor, candidates, residual, c, m, linalg);
  return scoreOpenCandidates(factor, candidates, weights, residual, c, m, open, linalg);
}
