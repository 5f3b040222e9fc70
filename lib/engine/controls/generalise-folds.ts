import { contiguousFolds } from '@/lib/engine/folds/contiguous-folds';
import { splitPositions } from '@/lib/engine/folds/split-positions';
import { stratifiedFolds } from '@/lib/engine/folds/stratified-folds';
import { randomSubset } from '@/lib/engine/random/random-subset';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { FoldSet, FoldSplit, FoldsSpec } from '@/lib/engine/readout/types';

const MOST_FOLDS = 10;
const FEWEST_TRAINING_TRIALS = 8;

/** Splits for generalisation: the same held-out trials, trained across the levels and within them on equally many trials. */
export interface GeneraliseFolds {
  across: FoldSet;
  within: FoldSet;
  nTrain: number;
}

/**
 * Folds over the test-level trials. Each is predicted twice: by a readout trained on n* random trials of the training
 * levels (across), and by one trained on n* of the other test-level trials (within), n* = the smaller of what both offer.
 *
 * `trials`: session trials that take part; `side[trial]` 0 train, 1 test, −1 neither; `y` over the session's trials.
 * Returns a message where there are too few trials. Cost O(n log n).
 */
export function generaliseFolds(
  trials: Int32Array,
  side: Int8Array,
  y: Float64Array,
  spec: FoldsSpec,
  nFolds: number,
  seed: number,
  control: number,
): GeneraliseFolds | { message: string } {
  const used = trials.filter((trial) => side[trial] >= 0);
  const test = Int32Array.from({ length: used.length }, (_, i) => i).filter((i) => side[used[i]] === 1);
  const train = Int32Array.from({ length: used.length }, (_, i) => i).filter((i) => side[used[i]] === 0);
  const k = Math.min(nFolds, MOST_FOLDS, Math.floor(test.length / 2));
  if (k < 2 || train.length < FEWEST_TRAINING_TRIALS) {
    return {
      message: `There are ${train.length} trials to train on and ${test.length} to test on; too few to compare.`,
    };
  }
  const purge = spec.kind === 'contiguous' ? spec.purgeTrials : 0;
  const labels = Float64Array.from(test, (i) => y[used[i]]);
  const own =
    spec.kind === 'contiguous'
      ? contiguousFolds(test.length, k)
      : stratifiedFolds(labels, k, seed, 2, control);
  const foldOf = new Int32Array(used.length).fill(-1);
  test.forEach((position, i) => (foldOf[position] = own[i]));
  const inside = Array.from({ length: k }, (_, fold) => splitPositions(foldOf, [fold], used, purge));
  const nTrain = Math.min(train.length, ...inside.map((split) => split.train.length));
  if (nTrain < FEWEST_TRAINING_TRIALS) {
    return { message: `Only ${nTrain} training trials are left on each side; too few to compare.` };
  }
  const make = (trainOf: (fold: number) => Int32Array, stream: number): FoldSet => {
    const splits = inside.map((split, fold): FoldSplit => {
      const pool = trainOf(fold);
      const generator = splitGenerator(seed, 'generalise', control, fold, stream);
      const picked = randomSubset(pool.length, nTrain, generator).map((at) => pool[at]);
      return { repeat: 0, fold, train: picked, test: split.test, nPurged: split.nPurged };
    });
    return { trials: used, nRepeats: 1, nFolds: k, purgeTrials: purge, foldOf: [foldOf], splits };
  };
  return { across: make(() => train, 0), within: make((fold) => inside[fold].train, 1), nTrain };
}
