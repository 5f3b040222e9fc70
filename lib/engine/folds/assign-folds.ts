import { contiguousFolds } from '@/lib/engine/folds/contiguous-folds';
import { stratifiedFolds } from '@/lib/engine/folds/stratified-folds';
import type { FoldsSpec } from '@/lib/engine/readout/types';

/** Each position's fold, one array a repeat. */
export interface FoldAssignment {
  foldOf: Int32Array[];
  k: number;
  purgeTrials: number;
}

/**
 * The outer folds of the trials that take part. `y` and `trials` run over positions (labels, session trials ascending).
 * Groups are numbered in ascending order of their codes. Given folds keep their numbers; k is the highest plus one.
 * Assumes a specification that `checkFolds` passed. Cost O(repeats·n log n).
 */
export function assignFolds(
  y: Float64Array,
  trials: Int32Array,
  spec: FoldsSpec,
  seed: number,
): FoldAssignment {
  switch (spec.kind) {
    case 'stratified': {
      const foldOf = Array.from({ length: spec.repeats }, (_, repeat) =>
        stratifiedFolds(y, spec.k, seed, 0, repeat),
      );
      return { foldOf, k: spec.k, purgeTrials: 0 };
    }
    case 'contiguous':
      return { foldOf: [contiguousFolds(y.length, spec.k)], k: spec.k, purgeTrials: spec.purgeTrials };
    case 'leaveOneGroupOut': {
      const codes = Array.from(new Set(Array.from(trials, (trial) => spec.group[trial]))).sort(
        (a, b) => a - b,
      );
      const at = new Map(codes.map((code, fold) => [code, fold]));
      return {
        foldOf: [Int32Array.from(trials, (trial) => at.get(spec.group[trial]) ?? 0)],
        k: codes.length,
        purgeTrials: 0,
      };
    }
    case 'given': {
      const foldOf = spec.assignment.map((row) => Int32Array.from(trials, (trial) => row[trial]));
      const k = foldOf.reduce((most, row) => row.reduce((a, b) => Math.max(a, b + 1), most), 0);
      return { foldOf, k, purgeTrials: 0 };
    }
  }
}
