import type { Prediction } from '@/lib/contracts/readout';
import { decodeCursor, encodeCursor } from '@/lib/http/cursor';
import type { Ctx } from '@/lib/services/context';
import { loadPredictions } from '@/lib/services/readouts/load-predictions';
import { readPredictions } from '@/lib/services/readouts/predictions-table';

/** A page of a readout's held-out predictions, ordered as they are kept: by window, repeat and trial. */
export async function listPredictions(
  ctx: Ctx,
  input: { readoutId: string; cursor?: string; limit?: number },
): Promise<{ items: Prediction[]; nextCursor: string | null }> {
  const { bytes } = await loadPredictions(ctx, input);
  const { window, repeat, fold, trial, label, predicted } = readPredictions(bytes);
  const start = decodeCursor(input.cursor, 1);
  const from = start === null ? 0 : Math.max(0, Number(start[0]) || 0);
  const to = Math.min(trial.length, from + (input.limit ?? 1_000));
  const items = Array.from({ length: Math.max(0, to - from) }, (_, offset) => {
    const row = from + offset;
    return {
      window: window[row],
      repeat: repeat[row],
      fold: fold[row],
      trial: trial[row],
      label: label[row],
      predicted: predicted[row],
    };
  });
  // A finished readout's rows never change, so the row's place is its key.
  return { items, nextCursor: to < trial.length ? encodeCursor([to]) : null };
}
