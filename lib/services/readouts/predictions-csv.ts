import type { PredictionColumns } from '@/lib/engine/readout/types';

/** Held-out predictions as CSV (RFC 4180): a header, then a row a held-out trial; numbers keep every digit. */
export function predictionsCsv(columns: PredictionColumns): string {
  const { window, repeat, fold, trial, label, predicted } = columns;
  const rows = ['window,repeat,fold,trial,label,predicted'];
  for (let row = 0; row < trial.length; row++)
    rows.push(`${window[row]},${repeat[row]},${fold[row]},${trial[row]},${label[row]},${predicted[row]}`);
  return `${rows.join('\r\n')}\r\n`;
}
