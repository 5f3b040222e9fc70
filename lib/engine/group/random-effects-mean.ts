import chisquareCdf from '@stdlib/stats-base-dists-chisquare-cdf';
import normalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import tQuantile from '@stdlib/stats-base-dists-t-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import { remlTau2 } from '@/lib/engine/group/reml-tau2';
import { weightedMean } from '@/lib/engine/group/weighted-mean';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';

/** A random-effects mean and how much the estimates differ. */
export interface RandomEffectsMean {
  k: number;
  mean: number;
  /** 1/√Σw, without Knapp and Hartung's factor. */
  standardError: number;
  /** √(max(1, q)/Σw): what the interval rests on. */
  standardErrorFloored: number;
  /** √(q/Σw): collapses to 0 for equal estimates. */
  standardErrorUnfloored: number;
  /** Knapp–Hartung, floored at max(1, q), t with k − 1 df. */
  interval: Interval;
  intervalUnfloored: Interval;
  /** Normal interval without Knapp and Hartung's factor, for comparison with older work. */
  intervalWald: Interval;
  tau2: number;
  tau2StandardError: number;
  /** Share of the variation that is not sampling, 0 … 1. */
  i2: number;
  q: { statistic: number; df: number; p: number };
  /** Where a new session's (or animal's) true value lies; null for k < 3. */
  predictionInterval: Interval | null;
  shares: Float64Array;
}

/**
 * Random-effects mean by restricted maximum likelihood, with Knapp and Hartung's interval.
 *
 * w = 1/(v + τ²), μ = Σwy/Σw, q = Σw(y − μ)²/(k − 1); interval μ ± t₍k−1₎√(max(1, q)/Σw), the unfloored with q alone.
 * Q = Σ(y − μ₀)²/v about the fixed-effect mean; I² = τ²/(τ² + s²), s² = (k − 1)Σv⁻¹/((Σv⁻¹)² − Σv⁻²);
 * se(τ²) = √(2/(Σw² − 2Σw³/Σw + (Σw²/Σw)²)); prediction interval μ ± t₍k−2₎√(τ² + max(1, q)/Σw).
 * Shapes: `estimates`, `variances` k ≥ 2, variances > 0 (squared standard errors). Units: the estimates'. Mutates nothing.
 * Throws EngineError for k < 2, bad values or a level outside (0, 1). Cost: about 300 passes over k.
 * Source: Viechtbauer, J. Educ. Behav. Stat. 2005 (REML); Knapp & Hartung, Stat. Med. 2003; floor: Röver, Knapp & Friede, BMC Med.
 * Res. Methodol. 2015; I²: Higgins & Thompson, Stat. Med. 2002; prediction: Higgins, Thompson & Spiegelhalter, J. R. Stat. Soc. A 2009.
 */
export function randomEffectsMean(
  estimates: ArrayLike<number>,
  variances: ArrayLike<number>,
  level = 0.95,
): RandomEffectsMean {
  requireLevel(level);
  const k = estimates.length;
  if (k < 2) throw new EngineError('notEstimable', 'A random-effects mean needs at least 2 estimates');
  const tau2 = remlTau2(estimates, variances);
  const { mean, standardError, weightedSquares, shares } = weightedMean(estimates, variances, tau2);
  const fixed = weightedMean(estimates, variances, 0);
  const q = weightedSquares / (k - 1);
  const standardErrorFloored = standardError * Math.sqrt(Math.max(1, q));
  const standardErrorUnfloored = standardError * Math.sqrt(q);
  const t = tQuantile(0.5 + level / 2, k - 1);
  const around = (half: number, method: string): Interval => ({
    low: mean - half,
    high: mean + half,
    level,
    method,
  });
  const predictionSd = Math.sqrt(tau2 + standardErrorFloored ** 2);
  return {
    k,
    mean,
    standardError,
    standardErrorFloored,
    standardErrorUnfloored,
    interval: around(t * standardErrorFloored, 'random effects (REML), Knapp–Hartung, floored'),
    intervalUnfloored: around(t * standardErrorUnfloored, 'random effects (REML), Knapp–Hartung, unfloored'),
    intervalWald: around(
      normalQuantile(0.5 + level / 2, 0, 1) * standardError,
      'random effects (REML), normal',
    ),
    tau2,
    tau2StandardError: tau2Error(variances, tau2),
    i2: tau2 / (tau2 + typicalVariance(variances)),
    q: {
      statistic: fixed.weightedSquares,
      df: k - 1,
      p: Math.max(0, 1 - chisquareCdf(fixed.weightedSquares, k - 1)),
    },
    predictionInterval:
      k < 3 ? null : around(tQuantile(0.5 + level / 2, k - 2) * predictionSd, 'prediction, t with k − 2 df'),
    shares,
  };
}

/** Higgins and Thompson's typical sampling variance. */
function typicalVariance(variances: ArrayLike<number>): number {
  // Scaled by the least variance: the ratio is free of overflow.
  let least = Infinity;
  for (let i = 0; i < variances.length; i += 1) least = Math.min(least, variances[i]);
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < variances.length; i += 1) {
    const w = least / variances[i];
    sum += w;
    squares += w * w;
  }
  const spread = sum * sum - squares;
  // One estimate outweighs all others by 1e16: its variance is the typical one.
  if (!(spread > 0)) return least;
  return (least * (variances.length - 1) * sum) / spread;
}

function tau2Error(variances: ArrayLike<number>, tau2: number): number {
  let least = Infinity;
  for (let i = 0; i < variances.length; i += 1) least = Math.min(least, variances[i] + tau2);
  let w1 = 0;
  let w2 = 0;
  let w3 = 0;
  for (let i = 0; i < variances.length; i += 1) {
    const w = least / (variances[i] + tau2);
    w1 += w;
    w2 += w * w;
    w3 += w * w * w;
  }
  const information = w2 - (2 * w3) / w1 + (w2 / w1) ** 2;
  return least * Math.sqrt(2 / Math.max(information, Number.EPSILON));
}
