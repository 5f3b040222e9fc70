import { EngineError } from '@/lib/engine/engine-error';
import { bcaLimits } from '@/lib/engine/measures/bca-limits';
import type { Interval } from '@/lib/engine/measures/interval';
import { jackknife } from '@/lib/engine/measures/jackknife';
import type { RandomSource } from '@/lib/engine/measures/random-source';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** Options of the test-trial interval. */
export interface BcaOptions {
  /** false: trials are drawn one by one; true (contiguous folds): in moving blocks. */
  blocks?: boolean;
  /** Trials a block; default (and least) ⌈n^(1/3)⌉. Only with `blocks`. */
  blockTrials?: number;
  /** Bootstrap resamples, at least 100; default 2000. */
  draws?: number;
  level?: number;
}

/**
 * BCa bootstrap interval of held-out R² over the held-out trials, with the fitted readouts held fixed: it says nothing
 * of how the readouts would change with other training trials, and covers less than its level.
 *
 * R²* = 1 − Σ*e²/Σ*b², sums over n trials drawn with replacement (or ⌈n/ℓ⌉ moving blocks of ℓ trials, the last one
 * cut so that n trials are drawn); acceleration by the jackknife over trials (or over consecutive blocks of ℓ).
 * Shapes: `squaredError` (y − ŷ)² and `squaredBaseline` (y − ȳ_train)², n each, in the order of the session; with
 * repeats pass each trial's mean over the repeats. Mutates only the state of `random`: n (or n/ℓ) integers a draw.
 * Returns null when n < 3, the baseline is 0 (also without one trial or block), or fewer than 2 blocks fit.
 * Resamples whose baseline is 0 are drawn again, at most 100 times in a row, then null.
 * Throws EngineError on unequal lengths, values that are negative or not finite, draws below 100, or a block out of range.
 * Cost: draws × n additions, or draws × n/ℓ with blocks. Tens of milliseconds at n = 2000, draws = 2000.
 * Source: Efron, J. Am. Stat. Assoc. 1987; moving blocks: Künsch, Ann. Stat. 1989; n^(1/3): Hall, Horowitz & Jing,
 * Biometrika 1995 (from memory).
 */
export function bcaInterval(
  squaredError: ArrayLike<number>,
  squaredBaseline: ArrayLike<number>,
  random: RandomSource,
  options: BcaOptions = {},
): Interval | null {
  const { blocks = false, draws = 2000, level = 0.95 } = options;
  const n = squaredError.length;
  requireNumbers('The squared error', squaredError);
  requireNumbers('The squared baseline', squaredBaseline, n);
  for (let i = 0; i < n; i += 1) {
    if (squaredError[i] < 0 || squaredBaseline[i] < 0) {
      throw new EngineError('invalidOption', `A squared deviation is negative at row ${i + 1}`, { trial: i });
    }
  }
  if (!Number.isInteger(draws) || draws < 100) {
    throw new EngineError('invalidOption', `A bootstrap interval needs at least 100 draws, not ${draws}`);
  }
  if (n < 3) return null;
  const least = leastBlock(n);
  const blockTrials = blocks ? (options.blockTrials ?? least) : 1;
  if (!Number.isInteger(blockTrials) || (blocks && blockTrials < least) || blockTrials > n) {
    throw new EngineError(
      'invalidOption',
      `A block must hold ${least} to ${n} trials (n^(1/3) at least), not ${blockTrials}`,
    );
  }
  const sums = prefixSums(squaredError, squaredBaseline);
  const r2 = ratio(sums.error[n], sums.baseline[n]);
  const nBlocks = Math.ceil(n / blockTrials);
  if (r2 === null || nBlocks < 2) return null;
  const replicates = new Float64Array(draws);
  for (let b = 0; b < draws; b += 1) {
    const value = drawOnce(sums, n, blockTrials, random);
    if (value === null) return null;
    replicates[b] = value;
  }
  const without = jackknife(nBlocks, r2, (block) => {
    const from = block * blockTrials;
    const to = Math.min(n, from + blockTrials);
    return ratio(
      sums.error[n] - (sums.error[to] - sums.error[from]),
      sums.baseline[n] - (sums.baseline[to] - sums.baseline[from]),
    );
  });
  if (without === null) return null;
  const { low, high } = bcaLimits(r2, replicates, without.acceleration, level);
  const unit = blocks ? `moving blocks of ${blockTrials} trials` : 'trials';
  return {
    low,
    high,
    level,
    method: `test-trial interval, readouts held fixed (BCa over ${unit}, ${draws} draws)`,
  };
}

/** ⌈n^(1/3)⌉, safe against the rounding of the cube root (8 → 2, not 3). */
function leastBlock(n: number): number {
  const root = Math.round(Math.cbrt(n));
  return root ** 3 >= n ? root : root + 1;
}

interface PrefixSums {
  /** Error and baseline of trial i side by side, at 2i and 2i + 1. */
  pairs: Float64Array;
  error: Float64Array;
  baseline: Float64Array;
}

function prefixSums(squaredError: ArrayLike<number>, squaredBaseline: ArrayLike<number>): PrefixSums {
  const n = squaredError.length;
  const error = new Float64Array(n + 1);
  const baseline = new Float64Array(n + 1);
  const pairs = new Float64Array(2 * n);
  for (let i = 0; i < n; i += 1) {
    pairs[2 * i] = squaredError[i];
    pairs[2 * i + 1] = squaredBaseline[i];
    error[i + 1] = error[i] + squaredError[i];
    baseline[i + 1] = baseline[i] + squaredBaseline[i];
  }
  return { error, baseline, pairs };
}

function ratio(error: number, baseline: number): number | null {
  if (!(baseline > 0)) return null;
  const value = 1 - Math.max(0, error) / baseline;
  return Number.isFinite(value) ? value : null;
}

function drawOnce(sums: PrefixSums, n: number, blockTrials: number, random: RandomSource): number | null {
  const starts = n - blockTrials + 1;
  for (let attempt = 0; attempt < 100; attempt += 1) {
    let error = 0;
    let baseline = 0;
    // The hot loop of the whole interval: single trials are added up without the detour of prefix sums.
    for (let drawn = 0; blockTrials === 1 && drawn < n; drawn += 1) {
      const at = 2 * random.integer(n);
      error += sums.pairs[at];
      baseline += sums.pairs[at + 1];
    }
    for (let drawn = 0; blockTrials > 1 && drawn < n; drawn += blockTrials) {
      const from = random.integer(starts);
      const to = from + Math.min(blockTrials, n - drawn);
      error += sums.error[to] - sums.error[from];
      baseline += sums.baseline[to] - sums.baseline[from];
    }
    const value = ratio(error, baseline);
    if (value !== null) return value;
  }
  return null;
}
