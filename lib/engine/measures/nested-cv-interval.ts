import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';
import { variance } from '@/lib/engine/measures/variance';

/**
 * One repeat's squared deviations. All over the same n trials, row i always the same trial.
 *
 * `pair…` are K × n, row-major: entry (k, i) belongs to the fit on the training trials of neither fold k nor fold[i]
 * (one fit serves (k, i of fold j) and (j, i of fold k), so K(K − 1)/2 fits). Entries with k = fold[i] or fold[i] < 0
 * are never read and may hold anything. A pair fit repeats the whole pipeline (scaling, penalty choice, purge gap).
 */
export interface NestedCvRepeat {
  nFolds: number;
  /** n; 0 … K − 1, or −1 for a trial that no fold holds out. */
  fold: Int32Array;
  /** n; (y − ŷ)² under the outer fit. */
  squaredError: Float64Array;
  /** n; (y − ȳ_train)² with the outer training mean. */
  squaredBaseline: Float64Array;
  /** K × n; (y − ŷ)² under the pair fit. */
  pairSquaredError: Float64Array;
  /** K × n; (y − ȳ_train)² with the pair fit's training mean. */
  pairSquaredBaseline: Float64Array;
}

/** What the interval is for. */
export interface NestedCvOptions {
  level?: number;
  /**
   * `fittedReadouts` (default): the R² that the K fitted readouts would reach on new trials; centred on the held-out R².
   * `allTrialsReadout`: the R² of one readout fitted to all trials; centred on the published bias correction.
   */
  target?: 'fittedReadouts' | 'allTrialsReadout';
}

/** The interval and its parts. */
export interface NestedCvInterval extends Interval {
  /** Held-out R², mean over repeats. */
  r2: number;
  /** The centre of the interval (differs from `r2` only for `allTrialsReadout`). */
  centre: number;
  standardError: number;
  /** sd(ℓ)/√n: what would hold if the losses were independent. */
  naiveStandardError: number;
  /** mean(a) − mean(b) before its bounds; may be negative. */
  meanSquaredError: number;
  /** R² of the outer fits less that of the pair fits on fewer trials, times 1 + (K − 2)/K: the published bias. */
  bias: number;
}

/**
 * Nested cross-validation interval of held-out R².
 *
 * Per repeat, with R² its pooled held-out R² and d = mean(y − ȳ_train)²:
 *   ℓᵢ = [(y − ŷ)ᵢ² − (1 − R²)(y − ȳ_train)ᵢ²] / d  for outer fits (e_out) and pair fits (e_in, same R² and d);
 *   a_k = (mean of e_in(k, i) over i outside fold k − mean of e_out over fold k)²,  b_k = var(e_out over fold k)/|fold k|;
 *   MSE = mean a − mean b over folds and repeats;
 *   se = √((K − 1)/K · max(0, MSE)), held between se₀ = √(mean over repeats of var(ℓ)/n) and √K·se₀;
 *   bias = (1 + (K − 2)/K)·(mean of e_in − mean of e_out) in loss; the corrected loss is mean e_in − bias;
 *   interval = centre ± z·se.
 * Shapes: `repeats` R ≥ 1, each as above, K ≥ 3. Range: not clipped to R² ≤ 1. Mutates nothing.
 * Returns null when it cannot be worked out: K < 3, d = 0, fewer than 2 folds with at least 2 trials, or n < 3.
 * Throws EngineError on shapes that disagree, a fold out of range, or values that are not finite where they are read.
 * Cost: R·K·n additions. Source: Bates, Hastie & Tibshirani, J. Am. Stat. Assoc. 2024 (119:1434), algorithm 1 and
 * sections 4.2–4.3; ℓ is the linearised ratio, so that the method applies to R².
 */
export function nestedCvInterval(
  repeats: readonly NestedCvRepeat[],
  options: NestedCvOptions = {},
): NestedCvInterval | null {
  const { level = 0.95, target = 'fittedReadouts' } = options;
  requireLevel(level);
  if (repeats.length === 0) throw new EngineError('invalidOption', 'The interval needs at least one repeat');
  const parts = repeats.map(summariseRepeat);
  const kept = parts.filter((part): part is RepeatSummary => part !== null);
  if (kept.length < parts.length) return null;
  const over = (pick: (part: RepeatSummary) => number): number =>
    kept.reduce((sum, part) => sum + pick(part), 0) / kept.length;
  const nFolds = repeats[0].nFolds;
  const r2 = over((part) => part.r2);
  const naiveStandardError = Math.sqrt(over((part) => part.naiveVariance));
  const meanSquaredError = over((part) => part.meanSquaredError);
  const lossIn = over((part) => part.meanLossIn);
  const scaled = Math.sqrt(((nFolds - 1) / nFolds) * Math.max(0, meanSquaredError));
  const standardError = Math.min(
    Math.sqrt(nFolds) * naiveStandardError,
    Math.max(naiveStandardError, scaled),
  );
  const bias = (1 + (nFolds - 2) / nFolds) * lossIn;
  // ℓ is a loss: what is added to it is taken from R². Its outer mean is 0, so mean e_in − bias is the corrected loss.
  const centre = target === 'fittedReadouts' ? r2 : r2 - (lossIn - bias);
  const half = normalQuantile(0.5 + level / 2, 0, 1) * standardError;
  if (!Number.isFinite(centre) || !Number.isFinite(half)) return null;
  return {
    low: centre - half,
    high: centre + half,
    level,
    method: 'nested cross-validation (Bates, Hastie & Tibshirani)',
    r2,
    centre,
    standardError,
    naiveStandardError,
    meanSquaredError,
    bias,
  };
}

interface RepeatSummary {
  r2: number;
  naiveVariance: number;
  meanSquaredError: number;
  meanLossIn: number;
}

function summariseRepeat(repeat: NestedCvRepeat): RepeatSummary | null {
  const { nFolds, fold, squaredError, squaredBaseline, pairSquaredError, pairSquaredBaseline } = repeat;
  const n = fold.length;
  requireNumbers('The squared error', squaredError, n);
  requireNumbers('The squared baseline', squaredBaseline, n);
  if (!Number.isInteger(nFolds) || nFolds < 1) {
    throw new EngineError('invalidOption', `The number of folds must be whole and positive, not ${nFolds}`);
  }
  if (pairSquaredError.length !== nFolds * n || pairSquaredBaseline.length !== nFolds * n) {
    throw new EngineError('shapeMismatch', `The pair losses must have ${nFolds} × ${n} values`);
  }
  if (nFolds < 3) return null;
  const rows: number[][] = Array.from({ length: nFolds }, () => []);
  let error = 0;
  let baseline = 0;
  let held = 0;
  for (let i = 0; i < n; i += 1) {
    if (fold[i] >= nFolds)
      throw new EngineError('invalidOption', `There is no fold ${fold[i]}`, { trial: i });
    if (fold[i] < 0) continue;
    rows[fold[i]].push(i);
    error += squaredError[i];
    baseline += squaredBaseline[i];
    held += 1;
  }
  if (held < 3 || !(baseline > 0)) return null;
  const ratio = error / baseline;
  const scale = baseline / held;
  const outer = new Float64Array(n);
  for (let i = 0; i < n; i += 1) outer[i] = (squaredError[i] - ratio * squaredBaseline[i]) / scale;
  const all: number[] = [];
  let difference = 0;
  let nPairFolds = 0;
  let sumIn = 0;
  let countIn = 0;
  for (let k = 0; k < nFolds; k += 1) {
    if (rows[k].length === 0) continue;
    const own = rows[k].map((i) => outer[i]);
    all.push(...own);
    let inside = 0;
    for (let j = 0; j < nFolds; j += 1) {
      if (j === k) continue;
      for (const i of rows[j]) {
        const at = k * n + i;
        inside += (pairSquaredError[at] - ratio * pairSquaredBaseline[at]) / scale;
      }
    }
    if (!Number.isFinite(inside)) {
      throw new EngineError('notFinite', `A pair loss beside fold ${k + 1} is not a finite number`, {
        fold: k,
      });
    }
    const nInside = held - own.length;
    if (nInside === 0) return null;
    sumIn += inside;
    countIn += nInside;
    const spread = variance(own);
    if (spread === null) continue;
    const gap = inside / nInside - own.reduce((sum, x) => sum + x, 0) / own.length;
    difference += gap * gap - spread / own.length;
    nPairFolds += 1;
  }
  const spreadAll = variance(all);
  if (nPairFolds < 2 || spreadAll === null) return null;
  return {
    r2: 1 - ratio,
    naiveVariance: spreadAll / held,
    meanSquaredError: difference / nPairFolds,
    meanLossIn: sumIn / countIn,
  };
}
