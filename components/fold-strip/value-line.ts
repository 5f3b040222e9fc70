import { chartNumber } from '@/components/charts/chart-number';
import type { StripData } from '@/components/fold-strip/strip-data';
import { formatValue } from '@/lib/format/format-value';

/** The spelled values of one trial, as they stand above the strip and are spoken. */
export function valueLine(data: StripData, trial: number): string {
  const parts = [`trial ${trial + 1}`];
  const block = data.block?.values[trial];
  if (data.block && block !== null && block !== undefined) parts.push(`${data.block.name} ${block}`);
  const out = data.excluded.find((entry) => entry.trial === trial);
  const fold = data.folds?.values[trial];
  if (fold !== null && fold !== undefined) parts.push(`fold ${fold + 1}`);
  const label = data.label?.values[trial];
  if (label !== null && label !== undefined) parts.push(`label ${formatValue(label)}`);
  else if (data.label) parts.push('label missing');
  const predicted = data.predicted?.[trial];
  if (predicted !== null && predicted !== undefined) {
    parts.push(`held-out ${chartNumber(predicted)}`);
    if (label !== null && label !== undefined)
      parts.push(`residual ${chartNumber(predicted - label, 2, true)}`);
  }
  const column = data.column?.values[trial];
  if (data.column && column !== null && column !== undefined)
    parts.push(`${data.column.name} ${formatValue(column)}`);
  if (out) parts.push(`left out: ${out.reason}`);
  else if (data.folds && (fold === null || fold === undefined)) parts.push('not in this readout');
  return parts.join(' · ');
}
