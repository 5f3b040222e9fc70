import { labelLevels } from '@/lib/engine/features/label-strata';
import { randomSubset } from '@/lib/engine/random/random-subset';
import { splitGenerator } from '@/lib/engine/random/split-generator';

/** Most label levels that are matched one by one; a label with more, or a continuous one, is cut into quartiles. */
const MOST_LEVELS = 8;
const N_QUANTILES = 4;

/**
 * A random part of the trials in which label and nuisance are balanced: within each quartile of the nuisance (each of its
 * categories) every label level (quartile for a continuous label) has the same number of trials.
 *
 * `y`, `nuisance` by position. Returns positions, ascending; empty where no cell can be balanced. `draw` tells the draws
 * of one seed apart. Cost O(n log n). Nothing passed in is changed.
 * Source: matching before the split as in Churchland et al., Nat. Neurosci. 2010 (mean matching), here on cells.
 */
export function matchedSubset(
  y: Float64Array,
  nuisance: Float64Array,
  isCategory: boolean,
  seed: number,
  control: number,
  draw: number,
): Int32Array {
  const levels = labelLevels(y);
  const strata =
    levels !== null && levels.values.length <= MOST_LEVELS ? levels.codes : quantileCodes(y, N_QUANTILES);
  const bins = isCategory ? Int32Array.from(nuisance) : quantileCodes(nuisance, N_QUANTILES);
  const nStrata = strata.reduce((most, code) => Math.max(most, code + 1), 0);
  const nBins = bins.reduce((most, code) => Math.max(most, code + 1), 0);
  const generator = splitGenerator(seed, 'matched', control, draw);
  const kept: number[] = [];
  for (let bin = 0; bin < nBins; bin++) {
    const cells: number[][] = Array.from({ length: nStrata }, () => []);
    bins.forEach((code, i) => {
      if (code === bin) cells[strata[i]].push(i);
    });
    const size = Math.min(...cells.map(({ length }) => length));
    if (size === 0) continue;
    for (const cell of cells)
      for (const at of randomSubset(cell.length, size, generator)) kept.push(cell[at]);
  }
  return Int32Array.from(kept).sort();
}

/** Quantile groups by rank; equal values share the group of the first of them. */
function quantileCodes(values: Float64Array, count: number): Int32Array {
  const order = Int32Array.from(values, (_, i) => i).sort((a, b) => values[a] - values[b] || a - b);
  const codes = new Int32Array(values.length);
  order.forEach((i, rank) => {
    const previous = rank > 0 ? order[rank - 1] : -1;
    codes[i] =
      previous >= 0 && values[previous] === values[i]
        ? codes[previous]
        : Math.floor((rank * count) / values.length);
  });
  return codes;
}
