/** What a fold strip shows, trial by trial in time order. Indices count from 0; null is "not known" or "left out". */
export interface StripData {
  nTrials: number;
  label: { name: string; values: readonly (number | null)[] } | null;
  /** Fold (0…nFolds−1) in which a trial was held out. */
  folds: { values: readonly (number | null)[]; nFolds: number; purgeTrials: number } | null;
  /** Held-out prediction; with a label it gives the residual lane. */
  predicted: readonly (number | null)[] | null;
  /** Trials left out, with their reasons. */
  excluded: readonly { trial: number; reason: string }[];
  /** Borders run through all lanes where this changes. */
  block: { name: string; values: readonly (string | number | null)[] } | null;
  /** One more column of the trial table. */
  column: { name: string; values: readonly (number | null)[] } | null;
}
