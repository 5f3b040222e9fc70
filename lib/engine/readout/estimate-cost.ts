import type { EstimatorSpec } from '@/lib/engine/readout/types';

/** Flops of one fold's fit, of one label on it, and the bytes that the fit keeps. */
export interface FoldCost {
  fit: number;
  label: number;
  bytes: number;
}

/**
 * Estimated cost of one fold with nTrain × p training features.
 * Fit: Gram matrix n·p·r, eigenvectors 9·r³ (or SVD 14·n·p·r), r = min(nTrain, p); inner folds fit again on their part.
 * Label: 2·nTrain·r·(candidates + 2), a quarter of the candidates where they are screened.
 */
export function estimateCost(estimator: EstimatorSpec, nTrain: number, nTest: number, p: number): FoldCost {
  const r = Math.min(nTrain, p);
  const isSvd = estimator.kind === 'leastSquares' || estimator.kind === 'pcr';
  const factor = isSvd
    ? 14 * nTrain * p * r
    : nTrain * p * r + 9 * r ** 3 + 2 * (nTrain + nTest) * p * Math.min(p, nTrain);
  const { candidates, nInner, isClosedForm } = shapeOf(estimator, nTrain);
  // Screening of ridge penalties in single precision takes about a quarter of what all of them in double would.
  const isScreened = isClosedForm && estimator.kind === 'ridge' && candidates >= 6;
  const scored = isScreened ? 0.25 * candidates : isClosedForm || nInner > 0 ? candidates : 1;
  const label = 2 * nTrain * r * (2 + scored);
  const keep = 8 * ((nTrain + nTest) * r + p * r + (nTrain + nTest) * p + candidates * (nTrain + 2 * r));
  return {
    fit: factor * (1 + nInner) + (isClosedForm ? 2 * nTrain * r * candidates : 0),
    label: label * (nInner > 0 ? 1.3 + 0.2 * nInner : 1),
    bytes: keep * (1 + nInner) + 16 * r * r,
  };
}

function shapeOf(
  estimator: EstimatorSpec,
  nTrain: number,
): { candidates: number; nInner: number; isClosedForm: boolean } {
  if (estimator.kind === 'leastSquares') return { candidates: 1, nInner: 0, isClosedForm: false };
  const spec = estimator.kind === 'ridge' ? estimator.penalty : estimator.components;
  if ('value' in spec) return { candidates: 1, nInner: 0, isClosedForm: false };
  const grid = 'grid' in spec ? spec.grid?.count : undefined;
  const most = 'max' in spec ? spec.max : undefined;
  const candidates = estimator.kind === 'ridge' ? (grid ?? 25) : (most ?? 20);
  if (spec.choose === 'innerFolds') return { candidates, nInner: spec.innerFolds ?? 5, isClosedForm: false };
  if (spec.choose === 'leaveOneOut' && estimator.kind !== 'ridge') {
    return { candidates, nInner: nTrain, isClosedForm: false };
  }
  return { candidates, nInner: 0, isClosedForm: true };
}
