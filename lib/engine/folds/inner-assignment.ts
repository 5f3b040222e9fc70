import { contiguousFolds } from '@/lib/engine/folds/contiguous-folds';
import { stratifiedFolds } from '@/lib/engine/folds/stratified-folds';
import type { FoldsSpec } from '@/lib/engine/readout/types';

/** Inner folds of one training set. */
export interface InnerAssignment {
  /** Inner fold of each training trial, parallel to the training positions. */
  foldOf: Int32Array;
  k: number;
  purgeTrials: number;
}

/**
 * Inner folds of the outer kind on the training trials: stratified by their labels, contiguous with the same purge gap,
 * or one group at a time; for given outer folds stratified. Only training labels are looked at.
 *
 * `y`, `trials`: labels and session trials of the training trials, in session order. `k` is lowered to half the number of
 * training trials where needed. One group alone falls back to stratified folds. Cost O(n log n).
 */
export function innerAssignment(
  y: Float64Array,
  trials: Int32Array,
  spec: FoldsSpec,
  k: number,
  seed: number,
  ...indices: number[]
): InnerAssignment {
  const nFolds = Math.max(2, Math.min(k, Math.floor(y.length / 2)));
  if (spec.kind === 'contiguous') {
    return { foldOf: contiguousFolds(y.length, nFolds), k: nFolds, purgeTrials: spec.purgeTrials };
  }
  if (spec.kind === 'leaveOneGroupOut') {
    const codes = Array.from(new Set(Array.from(trials, (trial) => spec.group[trial]))).sort((a, b) => a - b);
    if (codes.length >= 2) {
      const at = new Map(codes.map((code, fold) => [code, fold]));
      return {
        foldOf: Int32Array.from(trials, (trial) => at.get(spec.group[trial]) ?? 0),
        k: codes.length,
        purgeTrials: 0,
      };
    }
  }
  return { foldOf: stratifiedFolds(y, nFolds, seed, 1, ...indices), k: nFolds, purgeTrials: 0 };
}
