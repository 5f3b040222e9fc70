import type { ScatterTrial } from '@/components/charts/held-out-scatter';
import type { StripData } from '@/components/fold-strip/strip-data';
import type { Prediction } from '@/lib/contracts/readout';

/** One repeat's held-out predictions laid over the session's trials, for strip and scatter. */
export interface ReadoutPicture {
  trials: ScatterTrial[];
  folds: NonNullable<StripData['folds']>;
  predicted: (number | null)[];
  label: (number | null)[];
}

/**
 * Lays the predictions of the main window's first repeat over all trials of the session. Where folds were repeated, the
 * other repeats are in the table and the downloads, not in the drawing.
 */
export function readoutPicture(
  predictions: readonly Prediction[],
  nTrials: number,
  purgeTrials: number,
): ReadoutPicture {
  const folds = new Array<number | null>(nTrials).fill(null);
  const predicted = new Array<number | null>(nTrials).fill(null);
  const label = new Array<number | null>(nTrials).fill(null);
  const trials: ScatterTrial[] = [];
  let nFolds = 0;
  for (const row of predictions) {
    if (row.window !== 0 || row.repeat !== 0 || row.trial >= nTrials) continue;
    folds[row.trial] = row.fold;
    predicted[row.trial] = row.predicted;
    label[row.trial] = row.label;
    nFolds = Math.max(nFolds, row.fold + 1);
    trials.push({ trial: row.trial, label: row.label, predicted: row.predicted, fold: row.fold });
  }
  trials.sort((a, b) => a.trial - b.trial);
  return { trials, folds: { values: folds, nFolds: Math.max(1, nFolds), purgeTrials }, predicted, label };
}
