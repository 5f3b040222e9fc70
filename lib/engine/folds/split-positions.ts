/** Training and held-out positions, with the number that a purge gap took from training. */
export interface PositionSplit {
  train: Int32Array;
  test: Int32Array;
  nPurged: number;
}

/**
 * Splits positions into held-out ones (those in `folds`), training ones, and purged ones.
 *
 * A training trial is purged when its number in the session lies within `purgeTrials` of a held-out trial, so that
 * excluded trials still count as elapsed time. `trials` (session trial of each position) must ascend when a gap is
 * used. Positions with fold −1 take no part. Cost O(n).
 * Source of the gap: Racine, J. Econometrics 2000 (hv-block).
 */
export function splitPositions(
  foldOf: Int32Array,
  folds: readonly number[],
  trials: Int32Array,
  purgeTrials: number,
): PositionSplit {
  const n = foldOf.length;
  const isTest = new Uint8Array(n);
  for (let i = 0; i < n; i++) if (folds.includes(foldOf[i])) isTest[i] = 1;
  const isPurged = new Uint8Array(n);
  if (purgeTrials > 0) {
    let last = -Infinity;
    for (let i = 0; i < n; i++) {
      if (isTest[i] === 1) last = trials[i];
      else if (trials[i] - last <= purgeTrials) isPurged[i] = 1;
    }
    let next = Infinity;
    for (let i = n - 1; i >= 0; i--) {
      if (isTest[i] === 1) next = trials[i];
      else if (next - trials[i] <= purgeTrials) isPurged[i] = 1;
    }
  }
  const train: number[] = [];
  const test: number[] = [];
  let nPurged = 0;
  for (let i = 0; i < n; i++) {
    if (isTest[i] === 1) test.push(i);
    else if (foldOf[i] < 0) continue;
    else if (isPurged[i] === 1) nPurged++;
    else train.push(i);
  }
  return { train: Int32Array.from(train), test: Int32Array.from(test), nPurged };
}
