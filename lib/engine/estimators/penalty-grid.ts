import type { PenaltySpec } from '@/lib/engine/readout/types';

/**
 * The penalties to choose from, largest first. Default: λ = max(nTrain, p)·10^g for 25 values of g from −4 to 4;
 * otherwise `count` values evenly spaced in log λ between `from` and `to`; a fixed value is a grid of one.
 * `p` counts features before any is dropped.
 */
export function penaltyGrid(spec: PenaltySpec, nTrain: number, p: number): Float64Array {
  if ('value' in spec) return Float64Array.of(spec.value);
  if (spec.grid === undefined) {
    return Float64Array.from({ length: 25 }, (_, i) => Math.max(nTrain, p) * 10 ** (4 - i / 3));
  }
  const { from, to, count } = spec.grid;
  const low = Math.log10(Math.min(from, to));
  const high = Math.log10(Math.max(from, to));
  return Float64Array.from({ length: count }, (_, i) => 10 ** (high - ((high - low) * i) / (count - 1)));
}
