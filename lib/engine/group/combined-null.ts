import { EngineError } from '@/lib/engine/engine-error';
import { addOnePValue } from '@/lib/engine/measures/add-one-p-value';
import { countExceedances } from '@/lib/engine/measures/count-exceedances';
import type { RandomSource } from '@/lib/engine/measures/random-source';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** The weighted statistic and its null over sessions. */
export interface CombinedNull {
  observed: number;
  draws: Float64Array;
  exceedances: number;
  p: number;
  smallestP: number;
}

/**
 * Permutation null of a weighted mean over sessions. It tests "no signal in any session" and does not speak for animals.
 *
 * T = Σ share_s R²_s; T_b = Σ share_s R²_{s, π_s(b)}, π_s an independent random order of session s's own draws, so that sessions
 * which happened to shuffle alike are not paired alike. p = (b + 1)/(B + 1), B the fewest draws of any session.
 * Shapes: `observed`, `shares` S ≥ 1 (shares ≥ 0, with a positive sum; they are scaled to sum 1: pass those of the estimate);
 * `sessionDraws` S arrays of at least 1 finite value. Mutates only the state of `random`: one integer a draw and session.
 * Throws EngineError on shapes that disagree or values that are not finite. Cost: S·B.
 * Source: combination of independent permutation tests, Pesarin & Salmaso 2010 (from memory); p of Phipson & Smyth 2010.
 */
export function combinedNull(
  observed: ArrayLike<number>,
  sessionDraws: readonly ArrayLike<number>[],
  shares: ArrayLike<number>,
  random: RandomSource,
): CombinedNull {
  const nSessions = observed.length;
  requireNumbers("A session's value", observed);
  requireNumbers("A session's share", shares, nSessions);
  if (nSessions === 0 || sessionDraws.length !== nSessions) {
    throw new EngineError(
      'shapeMismatch',
      `${sessionDraws.length} null distributions stand beside ${nSessions} sessions`,
    );
  }
  let total = 0;
  let nDraws = Infinity;
  for (let s = 0; s < nSessions; s += 1) {
    if (shares[s] < 0) throw new EngineError('invalidOption', `The share of session ${s + 1} is negative`);
    total += shares[s];
    nDraws = Math.min(nDraws, sessionDraws[s].length);
    requireNumbers(`A null draw of session ${s + 1}`, sessionDraws[s]);
  }
  if (!(total > 0)) throw new EngineError('invalidOption', 'All shares are 0');
  if (nDraws < 1) throw new EngineError('notEstimable', 'A session has no null draws');
  let statistic = 0;
  const draws = new Float64Array(nDraws);
  for (let s = 0; s < nSessions; s += 1) {
    const share = shares[s] / total;
    statistic += share * observed[s];
    const order = Float64Array.from(sessionDraws[s]);
    for (let b = 0; b < nDraws; b += 1) {
      const pick = b + random.integer(order.length - b);
      const value = order[pick];
      order[pick] = order[b];
      draws[b] += share * value;
    }
  }
  const exceedances = countExceedances(statistic, draws);
  return {
    observed: statistic,
    draws,
    exceedances,
    p: addOnePValue(exceedances, nDraws),
    smallestP: 1 / (nDraws + 1),
  };
}
