/** A stretch of trials of one fold: half-open [from, to). */
export interface FoldRun {
  fold: number;
  from: number;
  to: number;
}

/**
 * The stretch of each fold if the folds are contiguous (a fold's trials follow each other, left-out trials aside);
 * null for folds that are woven.
 */
export function foldRuns(values: readonly (number | null)[], nFolds: number): FoldRun[] | null {
  const runs: FoldRun[] = [];
  let last: FoldRun | null = null;
  const seen = new Set<number>();
  for (let trial = 0; trial < values.length; trial += 1) {
    const fold = values[trial];
    if (fold === null) continue;
    if (last && last.fold === fold) {
      last.to = trial + 1;
      continue;
    }
    if (seen.has(fold)) return null;
    seen.add(fold);
    last = { fold, from: trial, to: trial + 1 };
    runs.push(last);
  }
  // A fold a trial is neither stair nor block: draw it as a weave.
  return runs.length > 1 && runs.length === values.filter((value) => value !== null).length
    ? null
    : seen.size <= nFolds
      ? runs
      : null;
}
