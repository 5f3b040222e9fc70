import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import type { FoldFit } from '@/lib/engine/crossval/fold-fit';
import type { Linalg } from '@/lib/engine/linalg/port';
import { gatherLabels } from '@/lib/engine/readout/gather-labels';
import { baselineOf } from '@/lib/engine/readout/run-observed';
import type { ChunkOutput, Task } from '@/lib/engine/readout/types';

/**
 * Squared errors of one split for label draws: `rows` holds m draws over all positions. Per draw the sums over the
 * held-out trials of (y* − ŷ)² and of (y* − baseline)².
 */
export function runDraws(
  task: Task,
  fit: FoldFit,
  train: Int32Array,
  test: Int32Array,
  rows: Float64Array,
  m: number,
  linalg: Linalg,
): ChunkOutput['values'] {
  const n = rows.length / m;
  const evaluated = evaluateLabels(fit, gatherLabels(rows, m, n, train), m, linalg);
  const { nTest } = fit.factor;
  const error = new Float64Array(m);
  const baseline = new Float64Array(m);
  for (let row = 0; row < m; row++) {
    const from = row * n;
    const reference = baselineOf(task, evaluated, row, nTest);
    let e = 0;
    let b = 0;
    for (let i = 0; i < nTest; i++) {
      const y = rows[from + test[i]];
      const de = y - evaluated.predicted[row * nTest + i];
      const db = y - reference[i];
      e += de * de;
      b += db * db;
    }
    error[row] = e;
    baseline[row] = b;
  }
  return { error, baseline };
}
