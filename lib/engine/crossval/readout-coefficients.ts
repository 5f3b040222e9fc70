import type { FactoredFold } from '@/lib/engine/crossval/fold-fit';
import { plsCoefficients } from '@/lib/engine/estimators/pls-coefficients';

/**
 * The coefficients α (on a factor's held-out directions) of every candidate for m projected labels `c` (m × r):
 * a function that writes candidate l's α of row `row` to out[at … at + r). Cost: r a call; partial least squares first
 * works out all components for all rows.
 */
export function readoutCoefficients(
  fold: FactoredFold,
  c: Float64Array,
  m: number,
): (l: number, row: number, out: Float64Array, at: number) => void {
  const { candidates, factor, plsComponents } = fold;
  const { r } = factor;
  if (candidates[0].components !== null && candidates[0].predict.length !== r) {
    const all = plsCoefficients(factor, c, m, plsComponents);
    return (l, row, out, at) => {
      const k = Math.min(candidates[l].components ?? 0, plsComponents);
      const from = (row * (plsComponents + 1) + k) * r;
      for (let j = 0; j < r; j++) out[at + j] = all[from + j];
    };
  }
  return (l, row, out, at) => {
    const gain = candidates[l].predict;
    const from = row * r;
    for (let j = 0; j < r; j++) out[at + j] = gain[j] * c[from + j];
  };
}
