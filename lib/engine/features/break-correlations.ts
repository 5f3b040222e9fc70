import type { Features } from '@/lib/engine/features/build-features';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';

/**
 * Breaks the correlations between units: each unit's trials are permuted among the trials of the same stratum
 * (label level or quantile) and the same fold, so that its tuning and the split stay as they were.
 *
 * `strata` and `foldOf`: one code a row. Returns new features; each unit's columns move together and each unit has
 * its own stream of `seed` and `repeat`. Cost O(n·p).
 * Source: Averbeck, Latham & Pouget, Nat. Rev. Neurosci. 2006 (trial shuffling).
 */
export function breakCorrelations(
  features: Features,
  strata: Int32Array,
  foldOf: Int32Array,
  seed: number,
  repeat: number,
): Features {
  const { n, p, x, columnsPerUnit } = features;
  const cells = new Map<string, number[]>();
  for (let i = 0; i < n; i++) {
    const key = `${foldOf[i]}/${strata[i]}`;
    const cell = cells.get(key);
    if (cell === undefined) cells.set(key, [i]);
    else cell.push(i);
  }
  const out = new Float64Array(x.length);
  for (let unit = 0; unit * columnsPerUnit < p; unit++) {
    const generator = splitGenerator(seed, 'break', repeat, unit);
    const first = unit * columnsPerUnit;
    for (const rows of cells.values()) {
      const from = Int32Array.from(rows);
      shuffle(from, generator);
      rows.forEach((row, i) => {
        for (let c = 0; c < columnsPerUnit; c++) out[row * p + first + c] = x[from[i] * p + first + c];
      });
    }
  }
  return { n, p, x: out, columnsPerUnit };
}
