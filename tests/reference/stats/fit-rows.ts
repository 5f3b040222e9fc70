import { evaluateLabels } from '@/lib/engine/crossval/evaluate-labels';
import { fitFold } from '@/lib/engine/crossval/fit-fold';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import type { EstimatorSpec } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';

const linalg = openNativeLinalg() ?? portableLinalg;

/** Trains the engine's estimator on all of `rows` and predicts `held`; several labels at once, one result row each. */
export function fitRows(
  rows: number[][],
  labels: number[][],
  held: number[][],
  estimator: EstimatorSpec,
  scaling: 'unit' | 'none' = 'unit',
): { predicted: number[][]; penalty: (number | null)[] } {
  const p = rows[0].length;
  const n = rows.length;
  const train = Int32Array.from({ length: n }, (_, i) => i);
  const test = Int32Array.from({ length: held.length }, (_, i) => n + i);
  const x = Float64Array.from([...rows, ...held].flat());
  const trials = Int32Array.from({ length: n + held.length }, (_, i) => i);
  const fit = fitFold({ x, p, train, test, estimator, scaling, trials }, linalg);
  const m = labels.length;
  const found = evaluateLabels(fit, Float64Array.from(labels.flat()), m, linalg);
  return {
    predicted: labels.map((_, l) =>
      Array.from(found.predicted.subarray(l * held.length, (l + 1) * held.length)),
    ),
    penalty: labels.map((_, l) => fit.candidates[found.choice[l]].penalty),
  };
}

/**
 * Intercept and slopes of a fitted readout, read off its predictions of held-out rows: the origin, and a step of ten
 * times the column's largest value along each column.
 */
export function coefficients(
  rows: number[][],
  y: number[],
  estimator: EstimatorSpec,
  scaling: 'unit' | 'none' = 'unit',
): number[] {
  const p = rows[0].length;
  const steps = Array.from({ length: p }, (_, j) => 10 * Math.max(...rows.map((row) => Math.abs(row[j]))));
  const held = [
    new Array<number>(p).fill(0),
    ...steps.map((step, j) => steps.map((_, c) => (c === j ? step : 0))),
  ];
  const [predicted] = fitRows(rows, [y], held, estimator, scaling).predicted;
  return [predicted[0], ...steps.map((step, j) => (predicted[j + 1] - predicted[0]) / step)];
}

/** Each row predicted by the readout that was fitted to all others. */
export function leaveOneOut(
  rows: number[][],
  y: number[],
  estimator: EstimatorSpec,
  scaling: 'unit' | 'none' = 'unit',
): number[] {
  return rows.map((row, i) => {
    const others = rows.filter((_, j) => j !== i);
    const labels = y.filter((_, j) => j !== i);
    return fitRows(others, [labels], [row], estimator, scaling).predicted[0][0];
  });
}
