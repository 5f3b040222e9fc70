import { labelLevels } from '@/lib/engine/features/label-strata';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';

/**
 * Random folds with every label level, or every part of a continuous label's range, spread over all of them.
 *
 * With levels: the trials of each level are shuffled and dealt to the folds in turn; dealing goes on where the level
 * before ended, so that fold sizes differ by at most one. Continuous: trials are sorted by label and each run of k
 * neighbours is dealt to the k folds in random order. The order of the folds is random.
 *
 * `y`: labels of the trials to be split (n). Returns each trial's fold, 0…k−1. `indices` tells streams of the same seed
 * apart (repeat, outer fold …). Cost O(n log n). Source: common practice, no source.
 */
export function stratifiedFolds(y: Float64Array, k: number, seed: number, ...indices: number[]): Int32Array {
  const n = y.length;
  const generator = splitGenerator(seed, 'folds', ...indices);
  const foldOf = new Int32Array(n);
  const levels = labelLevels(y);
  const names = Int32Array.from({ length: k }, (_, fold) => fold);
  shuffle(names, generator);
  if (levels !== null) {
    let dealt = 0;
    for (let code = 0; code < levels.values.length; code++) {
      const members = Int32Array.from({ length: n }, (_, i) => i).filter((i) => levels.codes[i] === code);
      shuffle(members, generator);
      for (const i of members) foldOf[i] = names[dealt++ % k];
    }
    return foldOf;
  }
  const order = Int32Array.from({ length: n }, (_, i) => i);
  shuffle(order, generator); // ties in the label must not follow the session's order
  const rank = new Int32Array(n);
  order.forEach((i, at) => (rank[i] = at));
  order.sort((a, b) => y[a] - y[b] || rank[a] - rank[b]);
  for (let start = 0; start < n; start += k) {
    shuffle(names, generator);
    for (let j = 0; j < k && start + j < n; j++) foldOf[order[start + j]] = names[j];
  }
  return foldOf;
}
