import fQuantile from '@stdlib/stats-base-dists-f-quantile';
import { EngineError } from '@/lib/engine/engine-error';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';

/** In how many sessions like these the label can be read out. */
export interface Prevalence {
  nSignificant: number;
  nSessions: number;
  /** max(0, (k/n − α)/(1 − α)). */
  estimate: number;
  interval: Interval;
}

/**
 * Prevalence of sessions with a signal that a test at level α would find.
 *
 * Of n sessions k have p ≤ α. A session is significant with probability θ ≤ γ + (1 − γ)α, γ the share with a signal; so
 * γ̂ = (k/n − α)/(1 − α), and Clopper and Pearson's limits of θ, put through the same line, are limits of γ; all held within [0, 1].
 * The lower limit holds whatever the power; the upper one speaks of signals strong enough to be found every time.
 * Shapes: whole 0 ≤ k ≤ n, n ≥ 1; α in (0, 1). Mutates nothing. Throws EngineError otherwise. Cost: two F quantiles.
 * Source: Ince, Paton, Kay & Schyns, eLife 2021 (the estimate, power taken as 1); Donhauser, Florin & Baillet, PLoS Comput. Biol. 2018
 * (from memory); Clopper & Pearson, Biometrika 1934.
 */
export function prevalence(nSignificant: number, nSessions: number, alpha = 0.05, level = 0.95): Prevalence {
  requireLevel(level);
  const isWhole = Number.isInteger(nSignificant) && Number.isInteger(nSessions);
  if (!isWhole || nSessions < 1 || nSignificant < 0 || nSignificant > nSessions) {
    throw new EngineError('invalidOption', `${nSignificant} of ${nSessions} is not a count of sessions`);
  }
  if (!(alpha > 0 && alpha < 1))
    throw new EngineError('invalidOption', `α must lie between 0 and 1, not at ${alpha}`);
  const k = nSignificant;
  const n = nSessions;
  const q = 0.5 + level / 2;
  const low = k === 0 ? 0 : k / (k + (n - k + 1) * fQuantile(q, 2 * (n - k + 1), 2 * k));
  const upper = k === n ? 1 : (k + 1) * fQuantile(q, 2 * (k + 1), 2 * (n - k));
  const high = k === n ? 1 : upper / (n - k + upper);
  const through = (rate: number): number => Math.min(1, Math.max(0, (rate - alpha) / (1 - alpha)));
  return {
    nSignificant,
    nSessions,
    estimate: through(k / n),
    interval: {
      low: through(low),
      high: through(high),
      level,
      method: 'Clopper–Pearson, less false positives',
    },
  };
}
