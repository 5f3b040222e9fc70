import { assignFolds } from '@/lib/engine/folds/assign-folds';
import { checkFoldAssignment, checkFoldsSpec } from '@/lib/engine/folds/check-folds';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import type { EngineProblem, FoldSet, FoldSplit, FoldsSpec } from '@/lib/engine/readout/types';

/**
 * The folds of some of a session's trials, with what there is to say about them. `set` is null when a problem stops it.
 * `y` runs over the session's trials, `trials` are those that take part, ascending.
 */
export function makeFoldSet(
  y: Float64Array,
  trials: Int32Array,
  spec: FoldsSpec,
  nTrials: number,
  labelName: string,
  seed: number,
): { set: FoldSet | null; problems: EngineProblem[] } {
  const labels = Float64Array.from(trials, (trial) => y[trial]);
  const problems = checkFoldsSpec(labels, trials, spec, nTrials, labelName);
  if (problems.some(({ severity }) => severity === 'stops')) return { set: null, problems };
  const folds = assignFolds(labels, trials, spec, seed);
  problems.push(...checkFoldAssignment(labels, trials, folds, labelName));
  if (problems.some(({ severity }) => severity === 'stops')) return { set: null, problems };
  const splits: FoldSplit[] = [];
  folds.foldOf.forEach((foldOf, repeat) => {
    for (let fold = 0; fold < folds.k; fold++) {
      const split: FoldSplit = { repeat, fold, ...splitPositions(foldOf, [fold], trials, folds.purgeTrials) };
      const inner = spec.kind === 'given' ? spec.inner?.[repeat]?.[fold] : undefined;
      if (inner !== undefined) split.inner = split.train.map((position) => inner[trials[position]]);
      splits.push(split);
    }
  });
  const set: FoldSet = {
    trials,
    nRepeats: folds.foldOf.length,
    nFolds: folds.k,
    purgeTrials: folds.purgeTrials,
    foldOf: folds.foldOf,
    splits,
  };
  return { set, problems };
}
