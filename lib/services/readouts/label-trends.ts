import { lag1Autocorrelation } from '@/lib/engine/measures/lag1-autocorrelation';
import { midranks } from '@/lib/engine/measures/midranks';
import { pearson } from '@/lib/engine/measures/pearson';

/**
 * Whether a label drifts over the session so much that no shuffle of it is a fair comparison: its rank correlation with
 * trial order is beyond chance (|z| of Fisher's transform above 3.29, two-sided p below .001) and explains at least 5 %
 * of the ranks' variance. The number of trials counts as n(1 − φ)/(1 + φ), φ the lag-1 autocorrelation of what the
 * trend leaves, so that a few long blocks in chance order are no trend. The bounds are ours: common practice, no source.
 * @param y the label of the included trials, in session order
 */
export function labelTrends(y: Float64Array): boolean {
  const n = y.length;
  if (n < 10) return false;
  const order = Float64Array.from(y.keys());
  const ranks = midranks(y);
  const rho = pearson(ranks, order);
  if (rho === null || rho ** 2 < 0.05) return false;
  if (1 - rho ** 2 < 1e-12) return true;
  const spread = (values: ArrayLike<number>, centre: number) =>
    Math.sqrt(Array.from(values).reduce((sum, value) => sum + (value - centre) ** 2, 0));
  const middle = (n - 1) / 2;
  const meanRank = Array.from(ranks).reduce((sum, rank) => sum + rank, 0) / n;
  const slope = (rho * spread(ranks, meanRank)) / spread(order, middle);
  const left = order.map((at) => ranks[at] - meanRank - slope * (at - middle));
  const phi = Math.max(0, lag1Autocorrelation(left) ?? 0);
  const effective = (n * (1 - phi)) / (1 + phi);
  return effective > 4 && Math.abs(Math.atanh(rho)) * Math.sqrt(effective - 3) > 3.29;
}
